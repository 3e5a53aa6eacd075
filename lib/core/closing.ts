import { listText } from "./quantity";
import type { Action } from "./custody-actions";
import type { ChipStateCode, ClosedKind } from "./words";

/** What stands in the way of closing a case, or makes a reason needed. Names are those that the log will hold. */
export interface ClosingFacts {
  received: boolean;
  returned: boolean;
  /** chips that need transfer */
  chips: { name: string; state: ChipStateCode }[];
  /** drives whose latest start-up test reported another serial */
  otherSerial: string[];
}

export const unverifiedChips = ({ chips }: Pick<ClosingFacts, "chips">): string[] => chips.filter((chip) => chip.state !== "verified").map((chip) => chip.name);

/** What a lead has to give a reason for; empty when the case closes by itself. */
export function openPoints(facts: ClosingFacts, kind: ClosedKind): string[] {
  const open = unverifiedChips(facts);
  return [
    ...(kind === "returned" ? [] : [kind === "cancelled" ? "The case is cancelled." : "It ends without a transfer."]),
    ...(open.length > 0 ? [`${listText(open)} ${open.length === 1 ? "is" : "are"} not verified.`] : []),
    ...facts.otherSerial.map((drive) => `${drive} reported another serial than its label.`),
    ...(kind !== "returned" && facts.received && !facts.returned ? ["No return is recorded: say where the parcel is."] : []),
  ];
}

/** Why it can't be closed like this, or null. */
export function closeRefusal(facts: ClosingFacts, kind: ClosedKind, reason: string | null): string | null {
  if (kind === "returned" && !facts.returned) return "Nothing is recorded as returned yet. Record the return first; or close the case as ended without a transfer or cancelled, with a reason.";
  const open = openPoints(facts, kind);
  if (open.length > 0 && !reason) return `${open.join(" ")} Write the reason for closing it all the same.`;
  return null;
}

/** What a case needs next of all that its page offers. */
export type CaseStep = "chips" | "start-up" | "summary" | "return" | "close";

export interface StepFacts extends Pick<ClosingFacts, "received" | "returned" | "chips"> {
  /** one a drive whose chips move: did its start-up test go as it should, null where it was not tested */
  tests: readonly (boolean | null)[];
  /** the data of every drive lies inside its main controller */
  nothingToMove: boolean;
  summarySent: boolean;
}

/** The one step that leads for somebody with these rights; null when it is not theirs, or somebody has to think first. */
export function leadingStep(f: StepFacts, can: { works: boolean; sends: boolean; returns: boolean; releases: boolean }): CaseStep | null {
  if (!f.nothingToMove) {
    if (f.chips.length === 0) return null;
    if (unverifiedChips(f).length > 0) return can.works ? "chips" : null;
    if (!f.returned && f.tests.includes(null)) return can.works ? "start-up" : null;
    if (!f.returned && f.tests.includes(false)) return null;
    if (!f.summarySent && can.sends) return "summary";
  }
  if (!f.received) return null;
  if (!f.returned) return can.returns ? "return" : null;
  return can.releases ? "close" : null;
}

/** The day from which the images are due for erasure. `day` is a calendar day of the workshop (year-month-day). */
export function erasureDay(day: string, days: number): string {
  const at = new Date(`${day}T00:00:00Z`);
  at.setUTCDate(at.getUTCDate() + days);
  return at.toISOString().slice(0, 10);
}

/**
 * What may still be written down about a closed case: what leaves the house, what the customer or an auditor does, notes,
 * and the end of a hand-over that was under way: who has a thing is to be known whatever becomes of its case. A new
 * hand-over is none of them. All else waits until a lead reopens it.
 */
const ON_A_CLOSED_CASE: ReadonlySet<Action> = new Set<Action>([
  "note.added", "case.closed", "case.reopened", "bundle.started", "bundle.completed", "summary.sent", "summary.opened", "share.withdrawn", "image.handed-out",
  "item.received", "item.not-received", "request.deletion-asked", "request.link-withdrawn", "log.assessed", "approval.refused",
  "image.found-damaged", "image.found-sound", "image.second-look", "images.checked",
  "image.erased", "case.erased", "case.kept-longer", "request.deletion-answered",
]);

export const isAllowedOnClosed = (action: Action): boolean => ON_A_CLOSED_CASE.has(action);

/** What usually goes back, to be ticked; nothing that is not on record. */
export interface ReturnFacts {
  drives: {
    letter: string;
    label: string;
    original: string | null;
    /** the donor board that took the images */
    donor: string | null;
    /** designators of chips that were moved to the donor board */
    moved: string[];
    /** designators of donor chips that made room for them */
    replaced: string[];
  }[];
  smallBoard: boolean;
  accessories: string | null;
}

const OF = (several: boolean, letter: string) => (several ? ` of Drive ${letter}` : "");

/** The list on the return form, on the summary and on the slip, in one wording. */
export function returnItems({ drives, smallBoard, accessories }: ReturnFacts): string[] {
  const several = drives.length > 1;
  return [
    ...drives.flatMap(({ letter, label, original, donor, moved, replaced }) => [
      `Drive ${letter}${label ? `, ${label}` : ""}`,
      ...(donor ? [`Donor board fitted to Drive ${letter}, ${donor}`] : []),
      ...(original ? [`Original board${OF(several, letter)}, ${original}${moved.length > 0 ? `, without ${listText(moved)}` : ""}`] : []),
      ...(replaced.length > 0 ? [`Removed donor ${replaced.length === 1 ? "chip" : "chips"} ${listText(replaced)}${OF(several, letter)}`] : []),
    ]),
    ...(smallBoard ? ["Enclosure with its small board"] : []),
    ...(accessories ? accessories.split(/[\n;]+/).map((one) => one.trim().slice(0, 200)).filter(Boolean) : []),
  ];
}
