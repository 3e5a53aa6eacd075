import { compositeWords } from "@/components/composite/composite-words";
import { listText } from "@/lib/core/quantity";
import type { ChipStateCode, Policy } from "@/lib/core/words";
import type { CaseView, ChipSummary, DriveView } from "@/lib/views";

/** What needs a person first: faults, then work at the bench, then waiting, then what is done. */
const URGENCY: readonly ChipStateCode[] = ["failed", "reads-disagree", "held", "written", "approved", "unread", "needs-reads", "ready", "verified"];

export function byUrgency(chips: readonly ChipSummary[]): ChipSummary[] {
  return [...chips].sort((a, b) => URGENCY.indexOf(a.state.state) - URGENCY.indexOf(b.state.state));
}

/** The original's chips that belong to the transfer. */
export function chipsToTransfer(drives: readonly DriveView[]): ChipSummary[] {
  return drives.flatMap((drive) => drive.boards).filter((board) => board.role === "original").flatMap((board) => board.chips).filter((chip) => chip.needsTransfer);
}

export function allVerified(drives: readonly DriveView[]): boolean {
  const chips = chipsToTransfer(drives);
  return chips.length > 0 && chips.every((chip) => chip.state.state === "verified");
}

/** The drive ends here: its own data lies inside the main controller. */
export function hasNoChipToMove(drive: Pick<DriveView, "boards">): boolean {
  return drive.boards.some((board) => board.role === "original" && board.dataInController);
}

/** What has to be recorded before anything can be read, the first of it; null when nothing is missing. */
export function recordsMissing(drives: readonly DriveView[]): string | null {
  if (drives.length === 0) return "Record the drive: what its label says";
  for (const drive of drives) {
    const of = drives.length > 1 ? ` of Drive ${drive.letter}` : "";
    const original = drive.boards.find((board) => board.role === "original");
    if (!original) return `Record the original board${of}`;
    if (!original.dataInController && original.chips.length === 0) return `Record the chip on the original board${of} that holds the drive’s own data`;
  }
  return null;
}

/** "opens when U3 and U12 are verified", or null when nothing is open. */
export function waitsFor(drives: readonly DriveView[]): string | null {
  const chips = chipsToTransfer(drives);
  const open = chips.filter((chip) => chip.state.state !== "verified");
  if (chips.length === 0) return drives.some(hasNoChipToMove) ? "there is no chip to move, so nothing to verify" : "opens when a chip is recorded and verified";
  if (open.length === 0) return null;
  return `opens when ${listText(open.map((chip) => chip.designator))} ${open.length === 1 ? "is" : "are"} verified`;
}

/** "none yet", "2 of 3 agree", "4 agree", "composite of 5 reads" */
export function readsWords(chip: Pick<ChipSummary, "countedReads" | "agreeingReads" | "composite">, policy: Policy): string {
  if (chip.composite) return compositeWords(chip.composite);
  if (chip.countedReads === 0) return "none yet";
  if (chip.agreeingReads === chip.countedReads && chip.countedReads >= policy.reads) return `${chip.agreeingReads} agree`;
  return `${chip.agreeingReads} of ${Math.max(policy.reads, chip.countedReads)} agree`;
}

/** What is known of the donor chip's own content: saved takes two equal reads. */
export function ownContentWords(donor: Pick<ChipSummary, "countedReads" | "agreeingReads" | "donorSaved">): { saved: boolean; words: string } {
  if (donor.donorSaved) return { saved: true, words: `saved, ${donor.agreeingReads} equal` };
  if (donor.countedReads >= 2) return { saved: false, words: donor.agreeingReads >= 2 ? "not of full size" : "reads differ" };
  return { saved: false, words: `${donor.countedReads} of 2 reads` };
}

/** The worst state in the case, for the ticket's stub: "Reads disagree (U3)". */
export function caseState(view: Pick<CaseView, "state" | "drives">): { state: ChipStateCode | null; words: string } {
  if (view.state === "closed") return { state: null, words: "Closed" };
  if (view.state === "requested") return { state: null, words: "Requested, parcel not here yet" };
  const [first] = byUrgency(chipsToTransfer(view.drives));
  if (!first) return { state: null, words: view.drives.length === 0 ? "No drive recorded yet" : view.drives.some(hasNoChipToMove) ? "No chip to move" : "No chip recorded yet" };
  return { state: first.state.state, words: `${first.state.label} (${first.designator})` };
}

/** The donor's view of a pair, wherever in the drive it is. */
export function donorOf(chip: ChipSummary, drive: DriveView): ChipSummary | null {
  return drive.boards.flatMap((board) => board.chips).find((other) => other.id === chip.pair?.id) ?? null;
}
