import { sameMarking } from "./donor-fit";
import { listText } from "./quantity";
import type { BoardRole, ChipStateCode } from "./words";

/** What these rules look at of a chip; the summaries of pages fit. */
export interface UnitChip {
  id: string;
  designator: string;
  boardRole: BoardRole;
  needsTransfer: boolean;
  state: { state: ChipStateCode; label: string };
  pair: { designator: string } | null;
}

/** Another chip of the same unit, as a chip's page names it. */
export interface Sibling {
  id: string;
  designator: string;
  state: ChipStateCode;
  label: string;
  /** nothing counted is read of it yet */
  unread: boolean;
}

/** Chips of one original board that are transferred together: two or more that need a transfer. Empty where there is no such unit. */
export function unitOf<C extends UnitChip>(chips: readonly C[]): C[] {
  const together = chips.filter((chip) => chip.boardRole === "original" && chip.needsTransfer);
  return together.length > 1 ? together : [];
}

export function siblingsOf(chips: readonly UnitChip[], chipId: string): Sibling[] {
  const unit = unitOf(chips);
  if (!unit.some((chip) => chip.id === chipId)) return [];
  return unit.filter((chip) => chip.id !== chipId).map(({ id, designator, state }) => ({ id, designator, state: state.state, label: state.label, unread: state.state === "unread" }));
}

/** "U12 belongs together with U14: both are transferred." */
export function unitWords(designators: readonly string[]): string {
  const [first, ...others] = designators;
  return `${first} belongs together with ${listText(others)}: ${designators.length === 2 ? "both" : `all ${designators.length}`} are transferred.`;
}

/** For approvals and write tickets: the unit and how far the other chips are. Null for a chip that stands alone. */
export function siblingWords(designator: string, siblings: readonly Sibling[]): string | null {
  if (siblings.length === 0) return null;
  return `${unitWords([designator, ...siblings.map((one) => one.designator)])} Now ${listText(siblings.map((one) => `${one.designator}: ${one.label}`))}.`;
}

const CLEARED: ReadonlySet<ChipStateCode> = new Set<ChipStateCode>(["approved", "written", "failed", "verified"]);

/** Said while one chip is cleared or further and another is not even read: a donor with one of two images does not start. */
export function leftBehind(chips: readonly UnitChip[]): string | null {
  const unit = unitOf(chips);
  const ahead = unit.filter((chip) => CLEARED.has(chip.state.state)).map((chip) => chip.designator);
  const unread = unit.filter((chip) => chip.state.state === "unread").map((chip) => chip.designator);
  return ahead.length > 0 && unread.length > 0 ? behindWords(ahead, unread) : null;
}

/** The same from one chip's point of view. */
export function leftBehindOf(chip: { designator: string; state: { state: ChipStateCode } }, siblings: readonly Sibling[]): string | null {
  const all = [{ designator: chip.designator, state: chip.state.state, unread: chip.state.state === "unread" }, ...siblings];
  const ahead = all.filter((one) => CLEARED.has(one.state)).map((one) => one.designator);
  const unread = all.filter((one) => one.unread).map((one) => one.designator);
  return ahead.length > 0 && unread.length > 0 && siblings.length > 0 ? behindWords(ahead, unread) : null;
}

function behindWords(ahead: readonly string[], unread: readonly string[]): string {
  return `${listText(ahead)} ${ahead.length === 1 ? "is" : "are"} cleared and ${listText(unread)} ${unread.length === 1 ? "is" : "are"} not read yet. Read ${listText(unread)} before the board goes on a drive.`;
}

/** A donor chip that is to take another chip's place: set when its name says that it is some other one's. */
export function crossing(donorDesignator: string, original: { designator: string } | null, originals: readonly { designator: string; needsTransfer: boolean }[]): string | null {
  if (!original || sameMarking(donorDesignator, original.designator)) return null;
  const own = originals.find((chip) => sameMarking(chip.designator, donorDesignator));
  if (!own) return null;
  return `Two chips swapped? Donor ${donorDesignator.toUpperCase()} would take the image of ${original.designator}, and the original has a ${own.designator} of its own.`;
}

/** Crossed pairs on record, one sentence each. */
export function crossedPairs(chips: readonly UnitChip[]): string[] {
  const originals = chips.filter((chip) => chip.boardRole === "original");
  return originals.flatMap((chip) => crossing(chip.pair?.designator ?? "", chip.pair ? chip : null, originals) ?? []);
}

/** The original's chip that a donor chip of this name is proposed for: the one of equal name without a pair. */
export function proposedOriginal<C extends { designator: string; pair: object | null }>(donorDesignator: string, originals: readonly C[]): C | null {
  return originals.find((chip) => !chip.pair && sameMarking(chip.designator, donorDesignator)) ?? null;
}

/** Original chips that need a transfer and are not verified: what stands against closing a case as done. */
export function unverifiedChips<C extends UnitChip>(drives: readonly { letter: string; boards: readonly { chips: readonly C[] }[] }[]): { letter: string; designator: string; chip: C }[] {
  return drives.flatMap((drive) => drive.boards.flatMap((board) => board.chips)
    .filter((chip) => chip.boardRole === "original" && chip.needsTransfer && chip.state.state !== "verified")
    .map((chip) => ({ letter: drive.letter, designator: chip.designator, chip })));
}
