import { bareMarking, sameMarking } from "./donor-fit";

/** A look first, before or after a drive is recorded. Nothing here refuses anything. */
export interface DriveWarning {
  code: "same-drive-here" | "serial-elsewhere" | "serial-looks-alike" | "look-alike-characters";
  kind: "caution" | "note";
  title: string;
  text: string;
  /** where the other drive is, for who may see it */
  cases: { id: string; ref: string }[];
}

/** A drive on record that a new one is held against. */
export interface KnownDrive {
  caseId: string;
  caseRef: string;
  letter: string;
  partNumber: string | null;
  serial: string | null;
}

const ALIKE: Record<string, string> = { O: "0", I: "1", L: "1", S: "5", B: "8", Z: "2" };
/** letters that are read for digits and the other way round, as drives_folded of the query folds them too */
export const LOOK_ALIKES: readonly (readonly [letter: string, digit: string])[] = Object.entries(ALIKE);

/** The serial with every character that looks like another put to one form, without spaces and case. */
export function foldedSerial(text: string): string {
  return bareMarking(text).replace(/[OILSBZ]/g, (letter) => ALIKE[letter]);
}

const NAMES = "O and 0, I and 1, L and 1, S and 5, B and 8, Z and 2";

/** Both of a pair stand in it, or one beside digits only: the label has to be looked at. */
function hasLookAlikes(serial: string): boolean {
  const bare = bareMarking(serial);
  return LOOK_ALIKES.some(([letter, digit]) => bare.includes(letter) && bare.includes(digit));
}

function onceEach(drives: readonly KnownDrive[]): DriveWarning["cases"] {
  return [...new Map(drives.map((drive) => [drive.caseId, { id: drive.caseId, ref: drive.caseRef }])).values()].sort((a, b) => a.ref.localeCompare(b.ref));
}

const refs = (cases: DriveWarning["cases"]) => cases.map((one) => one.ref).join(", ");
const where = (cases: DriveWarning["cases"]) => `${cases.length === 1 ? "case" : "cases"} ${refs(cases)}`;

/**
 * What speaks against this label data. `others` are drives whose folded serial is the same, never the drive itself and
 * only from cases that the asker may see; `caseId` is the drive's own case. No customer is named.
 */
export function driveWarnings(drive: { partNumber: string | null; serial: string | null }, caseId: string, others: readonly KnownDrive[]): DriveWarning[] {
  const { serial, partNumber } = drive;
  if (!serial?.trim()) return [];
  const equal = others.filter((other) => other.serial !== null && sameMarking(other.serial, serial));
  const alike = others.filter((other) => other.serial !== null && !sameMarking(other.serial, serial) && foldedSerial(other.serial) === foldedSerial(serial));
  const samePart = (other: KnownDrive) => (partNumber && other.partNumber ? sameMarking(partNumber, other.partNumber) : !partNumber && !other.partNumber);
  const twin = equal.find((other) => other.caseId === caseId && samePart(other));
  const elsewhere = onceEach(equal.filter((other) => other.caseId !== caseId));
  const alikeCases = onceEach(alike);
  const found: DriveWarning[] = [];
  if (twin) {
    found.push({ code: "same-drive-here", kind: "caution", title: `Drive ${twin.letter} of this case has the same ${partNumber ? "part number and serial" : "serial"}.`, text: "Look at both labels. One drive is recorded once.", cases: [] });
  }
  if (elsewhere.length > 0) {
    found.push({ code: "serial-elsewhere", kind: "caution", title: `Duplicate serial in another case: ${refs(elsewhere)}.`, text: "Look at the label again. If it is the same drive, it has been here before: say so in a note.", cases: elsewhere });
  }
  if (alikeCases.length > 0) {
    found.push({ code: "serial-looks-alike", kind: "note", title: `A drive of ${where(alikeCases)} differs only in characters that look alike.`, text: `Look at the label: ${NAMES}.`, cases: alikeCases });
  } else if (found.length === 0 && hasLookAlikes(serial)) {
    found.push({ code: "look-alike-characters", kind: "note", title: "Some characters of this serial are easily mistaken.", text: `Look at the label: ${NAMES}.`, cases: [] });
  }
  return found;
}
