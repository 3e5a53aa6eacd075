import type { BoardRole } from "@/lib/core/words";
import type { BoardView, DriveView } from "@/lib/views";
import { originalOf } from "./drive-words";

/** One form of the way from a drive's label to its donor's chip. */
export type Step = { kind: "drive" } | { kind: "board"; role: BoardRole } | { kind: "chip"; boardId: string };

/** What is recorded next on a drive, by what is on record; null when nothing is missing. */
export function nextStep(drive: Pick<DriveView, "boards">): Step | null {
  const original = originalOf(drive);
  if (!original) return { kind: "board", role: "original" };
  if (original.dataInController) return null;
  if (original.chips.length === 0) return { kind: "chip", boardId: original.id };
  const donor = drive.boards.filter((board) => board.role === "donor").at(-1);
  if (!original.chips.some((chip) => chip.needsTransfer && !chip.pair)) return null;
  return donor ? { kind: "chip", boardId: donor.id } : { kind: "board", role: "donor" };
}

/** The words of the button that saves this form and opens the next; null where this form is the last. */
export function goOnWords(step: Step, drive: Pick<DriveView, "boards"> | null, typed: { dataInController?: boolean; needsTransfer?: boolean } = {}): string | null {
  if (step.kind === "drive") return "Save and go on with the board";
  if (!drive) return null;
  const original = originalOf(drive);
  if (step.kind === "board") {
    if (step.role === "original") return typed.dataInController ? null : "Save and go on with the chip";
    return original?.chips.some((chip) => chip.needsTransfer && !chip.pair) ? "Save and go on with its chip" : null;
  }
  const board = boardOf(drive, step.boardId);
  if (board?.role === "original") {
    if (board.dataInController || typed.needsTransfer === false) return null;
    return drive.boards.some((one) => one.role === "donor") ? "Save and go on with the donor’s chip" : "Save and go on with the donor board";
  }
  const unpaired = original?.chips.filter((chip) => chip.needsTransfer && !chip.pair) ?? [];
  return unpaired.length > 1 ? "Save and go on with the next chip" : null;
}

export function boardOf(drive: Pick<DriveView, "boards">, id: string): BoardView | null {
  return drive.boards.find((board) => board.id === id) ?? null;
}
