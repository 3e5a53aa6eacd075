import { listText } from "./quantity";
import type { ChipStateCode, TransferKind } from "./words";

/** One test of the drive on its donor board, as recorded. */
export interface StartUpFacts {
  spins: boolean;
  ready: boolean;
  reportedSerial: string | null;
  /** null where the label's or the reported serial is missing */
  serialMatches: boolean | null;
  attempts: number;
}

/** Letters and digits alone count: how a serial is grouped and in which case it is typed differs from place to place. */
const bare = (serial: string) => serial.normalize("NFKC").toUpperCase().replace(/[^\p{L}\p{N}]/gu, "");

/** Does the drive report the serial of its label? Null when either is missing. */
export function serialMatches(label: string | null | undefined, reported: string | null | undefined): boolean | null {
  const [a, b] = [bare(label ?? ""), bare(reported ?? "")];
  return a === "" || b === "" ? null : a === b;
}

/** While it is typed: could this still become the serial of the label? Nobody is stopped over a serial that is half typed. */
export function mayBecome(label: string | null | undefined, typed: string | null | undefined): boolean {
  return bare(label ?? "").startsWith(bare(typed ?? ""));
}

/** Why a start-up test decides nothing good: another drive's serial came back. */
export const OTHER_SERIAL_TITLE = "Stop: the drive reports another drive’s serial.";
export const OTHER_SERIAL_TEXT = "Power it off. The wrong image or the wrong board is on it. Compare board, chip and image with the labels before anything is powered again.";

export interface ChipToTest {
  designator: string;
  state: ChipStateCode;
  label: string;
  /** of the latest transfer; null before one */
  transferKind: TransferKind | null;
}

/** A moved chip may be started before it is read back: no write could have gone wrong in it. */
const startable = ({ state, transferKind }: ChipToTest) => state === "verified" || (state === "written" && transferKind === "chip-moved");

/** Why the drive may not be started yet, or null. `chips` are those that need transfer. */
export function startUpRefusal(chips: readonly ChipToTest[]): string | null {
  if (chips.length === 0) return "No chip of this drive that needs transfer is recorded, so the donor board can’t start it. Record the chip first.";
  const open = chips.filter((chip) => !startable(chip));
  if (open.length === 0) return null;
  const names = listText(open.map(({ designator, label }) => `${designator} (${label})`));
  return `${names} ${open.length === 1 ? "is" : "are"} not verified yet. Finish ${open.length === 1 ? "it" : "them"} first: a drive is started only with what was read back and found equal.`;
}

/**
 * Was this read-back taken after the board's first power-on on the drive since that transfer? Drives rewrite their chips
 * from then on. Where a time is claimed for the read it counts; nobody can claim one after it was stored. Times in ms.
 */
export function afterPowerOn(read: { takenAt: number | null; storedAt: number }, transferAt: number, tests: readonly number[]): boolean {
  const taken = Math.min(read.takenAt ?? read.storedAt, read.storedAt);
  return tests.some((at) => at > transferAt && at < taken);
}

/** "spins, ready, reports the serial of its label; 2 attempts" */
export function startUpWords({ spins, ready, serialMatches: matches, attempts }: StartUpFacts): string {
  const parts = [spins ? "spins" : "does not spin", ready ? "gets ready" : "does not get ready"];
  if (matches !== null) parts.push(matches ? "reports the serial of its label" : "reports another serial than its label");
  return `${listText(parts)}; ${attempts === 1 ? "1 attempt" : `${attempts} attempts`}`;
}
