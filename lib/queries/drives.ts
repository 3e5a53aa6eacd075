import { QueryTypes } from "sequelize";
import { caseFor, driveFor, driveLetter } from "@/lib/commands/place";
import { allow, casesOf } from "@/lib/commands/refuse";
import { type AskedDrive, answerOf, driveFromRequest } from "@/lib/core/drive-from-request";
import { type DriveWarning, driveWarnings, foldedSerial, type KnownDrive, LOOK_ALIKES } from "@/lib/core/drive-warnings";
import type { Actor, Encryption } from "@/lib/core/words";
import type { DriveLook } from "@/lib/schemas/drive";
import type { CaseView, DriveView } from "@/lib/views";
import { connection, CustodyHead, Customer, type Drive, Request } from "@/models";
import { boardViews } from "./boards";
import { seenBy } from "./seen-by";

export async function driveView(actor: Actor, id: string): Promise<DriveView & { case: { id: string; ref: string; customerName: string; open: boolean } }> {
  allow(actor, "case.read");
  const { drive, case: found } = await driveFor(actor, id);
  const customer = await Customer.findByPk(found.customerId);
  const head = await CustodyHead.findByPk(id);
  return seenBy(actor, {
    ...driveFactsView(drive), warnings: await warningsOf(actor, drive),
    boards: (await boardViews([id])).get(id) ?? [], custodyEntries: head?.seq ?? 0, case: { id: found.id, ref: found.ref, customerName: customer?.name ?? "", open: !found.closedAt },
  });
}

/** What is typed of a drive, for the page of the drive and that of its case. */
export function driveFactsView(drive: Drive): Omit<DriveView, "warnings" | "boards" | "custodyEntries"> {
  return {
    id: drive.id, caseId: drive.caseId, letter: driveLetter(drive), partNumber: drive.partNumber ?? null, model: drive.model ?? null, serial: drive.serial ?? null, interface: drive.interface ?? null,
    capacity: drive.capacity ?? null, made: drive.made ?? null, firmware: drive.firmware ?? null, encryption: drive.encryption ?? null,
  };
}

/** The serial as the database folds it, word for word like `foldedSerial`. */
const FOLDED = LOOK_ALIKES.reduce((text, [letter, digit]) => `REPLACE(${text}, '${letter}', '${digit}')`, "REPLACE(UPPER(drives.serial), ' ', '')");

/** Drives with this serial, or one that looks like it, in the cases that the actor may see. */
async function likeSerial(actor: Actor, serial: string, except: string | null): Promise<KnownDrive[]> {
  const only = casesOf(actor);
  if (only?.length === 0) return [];
  const rows = await connection().query<{ caseId: string; caseRef: string; position: number; partNumber: string | null; serial: string | null }>(
    `SELECT cases.id AS caseId, cases.ref AS caseRef, drives.position, drives.part_number AS partNumber, drives.serial FROM drives JOIN cases ON cases.id = drives.case_id
     WHERE ${FOLDED} = ? AND drives.id <> ? ${only ? "AND cases.id IN (?)" : ""} ORDER BY cases.ref, drives.position LIMIT 50`,
    { replacements: [foldedSerial(serial), except ?? "", ...(only ? [only] : [])], type: QueryTypes.SELECT },
  );
  return rows.map(({ position, ...row }) => ({ ...row, letter: driveLetter({ position }) }));
}

export async function warningsOf(actor: Actor, drive: Pick<Drive, "id" | "caseId" | "partNumber" | "serial">): Promise<DriveWarning[]> {
  if (!drive.serial) return [];
  const facts = { partNumber: drive.partNumber ?? null, serial: drive.serial };
  // that some letters are easily mistaken helps while the label is typed, not for ever after
  return driveWarnings(facts, drive.caseId, await likeSerial(actor, drive.serial, drive.id)).filter((one) => one.code !== "look-alike-characters");
}

/** The same while the label is typed: nothing is stored by asking. */
export async function warningsWhileTyping(actor: Actor, caseId: string, { partNumber, serial, except }: DriveLook): Promise<{ warnings: DriveWarning[] }> {
  // first whether it is there for them: what is refused must not tell of a case outside an auditor's list
  await caseFor(actor, caseId);
  allow(actor, "drive.record");
  if (!serial) return { warnings: [] };
  return { warnings: driveWarnings({ partNumber: partNumber ?? null, serial }, caseId, await likeSerial(actor, serial, except ?? null)) };
}

/** Label data as the customer typed it in the request; empty where the case came another way. */
export async function askedDrive(actor: Actor, caseId: string): Promise<AskedDrive & { encryption?: Encryption }> {
  allow(actor, "case.read");
  await caseFor(actor, caseId);
  const request = await Request.findOne({ where: { caseId }, attributes: ["answers"] });
  if (!request) return {};
  const answers: unknown = JSON.parse(request.answers);
  const lock = answerOf(answers, "lock");
  // a password may be of the computer only: somebody looks before it counts as encrypted
  return { ...driveFromRequest(answers), ...(lock === "known" || lock === "lost" ? { encryption: "suspected" as const } : {}) };
}

const FROM_ADDRESS = ["partNumber", "model", "serial", "interface"] as const;

/**
 * How the drive form begins on the page of a case: open when the address asks for it (`?record=drive`), filled in with
 * what the address carries and what the customer asked with. The request speaks of one drive, so only the first is filled in.
 */
export async function driveToRecord(actor: Actor, view: Pick<CaseView, "id" | "drives">, query: Record<string, string | string[] | undefined>): Promise<{ opened: boolean; proposed: Awaited<ReturnType<typeof askedDrive>> }> {
  const opened = query.record === "drive";
  const given = Object.fromEntries(FROM_ADDRESS.flatMap((name) => (opened && typeof query[name] === "string" ? [[name, query[name].slice(0, 120)]] : [])));
  return { opened, proposed: { ...(view.drives.length === 0 ? await askedDrive(actor, view.id) : {}), ...given } };
}
