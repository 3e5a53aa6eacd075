import { env } from "@/lib/env";
import type { ImageUse } from "@/lib/queries/image-uses";
import type { Transaction } from "@/models";
import { type Alarm, queueAlarm } from "./queue-alarm";

const LISTED = 40;
const ROLES = ["lead", "admin"] as const;
const TO_DO = "What to do: put the image back from a backup, or read the chip again: a new read with the same bytes takes its place. A photo comes back when the same file is sent once more. Until then it is not shown, compared, approved, handed out or put into a bundle.";

export interface Faulty {
  sha256: string;
  state: "damaged" | "missing";
  /** the end of a sentence that begins with "It"; null where nothing more is known */
  why: string | null;
}

const list = (uses: ImageUse[]) => [...uses.slice(0, LISTED).map((use) => `  ${use.name}`), ...(uses.length > LISTED ? [`  and ${uses.length - LISTED} more`] : [])];
const pageOf = ({ chipId, driveId, caseId }: ImageUse) => (chipId ? `/chips/${chipId}` : driveId ? `/drives/${driveId}` : caseId ? `/cases/${caseId}` : null);
const link = (uses: ImageUse[]) => uses.slice(0, 1).map(pageOf).filter((page) => page !== null).map((page) => `${env().publicUrl}${page}`);
const fell = (approvals: number) => (approvals === 0 ? [] : [approvals === 1 ? "The approval that stood on it fell." : `The ${approvals} approvals that stood on it fell.`]);

/** Says to the leads and admins that one stored image is not what was stored: which, what it is kept as, what to do. */
export async function mailFaulty(tx: Transaction, { sha256, state, why }: Faulty, where: string, uses: ImageUse[], approvals: number): Promise<void> {
  const alarm: Alarm = {
    roles: ROLES, caseId: null, subject: `A stored image is ${state}: ${uses[0]?.name ?? `${sha256.slice(0, 8)}…, of nothing on record`}`,
    text: [
      state === "missing" ? "A stored image is gone: under its name lies no file. Twinread looked twice." : "A stored image is no longer what was stored. Twinread read it twice.",
      "", `SHA-256  ${sha256}`, ...(why ? [`Found    It ${why}.`] : []), `Found by ${where}`, `File     images/sha256/${sha256.slice(0, 2)}/${sha256} in the data folder`,
      "", uses.length === 0 ? "Nothing on record is kept in it." : "It is kept as", ...list(uses), "", ...fell(approvals), TO_DO, ...link(uses),
    ].join("\n"),
  };
  await queueAlarm(tx, alarm);
}

/** The images as a whole are away: said once, for no single image is to blame. */
export async function mailStoreAway(tx: Transaction, sentence: string): Promise<void> {
  await queueAlarm(tx, {
    roles: ROLES, caseId: null, subject: "The stored images are away",
    text: [sentence, "", "What to do: look at the disk that holds the data folder's images/sha256. If the images were lost, stop Twinread and put them back from a backup before anybody uploads again.", env().publicUrl].join("\n"),
  });
}

/** After a drive's round in which more than the one image told about already was found: the others in one mail. */
export async function mailMoreFaulty(tx: Transaction, drive: string, faulty: Omit<Faulty, "why">[], uses: ImageUse[]): Promise<void> {
  await queueAlarm(tx, {
    roles: ROLES, caseId: null, subject: `${faulty.length} more stored ${faulty.length === 1 ? "image is" : "images are"} damaged or missing: ${drive}`,
    text: [
      `The check of the stored images of ${drive} has ended. Besides the one you were told about it found:`,
      "", ...faulty.slice(0, LISTED).map((one) => `  ${one.state}  ${one.sha256}`), ...(faulty.length > LISTED ? [`  and ${faulty.length - LISTED} more`] : []),
      "", "They are kept as", ...list(uses), "", "Approvals that stood on them fell. So many at once point to the disk: look at it before anything else.", TO_DO, ...link(uses),
    ].join("\n"),
  });
}
