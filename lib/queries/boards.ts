import { donorFit } from "@/lib/core/donor-fit";
import type { BoardView, ChipSummary } from "@/lib/views";
import { Board } from "@/models";
import { chipRecords } from "./chip-records";
import { chipState } from "./chip-state";
import { donorSummary, originalSummary, UNPAIRED } from "./chip-summary";
import { currentPolicy } from "./policy";

/** Boards with their chips, by drive. */
export async function boardViews(driveIds: string[]): Promise<Map<string, BoardView[]>> {
  const boards = await Board.findAll({ where: { driveId: driveIds }, order: ["role", "createdAt"] });
  const [{ records, lone }, policy] = [await chipRecords(driveIds), await currentPolicy()];
  const chips = new Map<string, ChipSummary[]>();
  const put = (boardId: string, chip: ChipSummary) => chips.set(boardId, [...(chips.get(boardId) ?? []), chip]);
  for (const record of records) {
    const state = await chipState(record, policy);
    put(record.board.id, await originalSummary(record, state));
    if (record.donor) put(record.donor.board.id, await donorSummary(record.donor.chip, record.donor.board, record.own, record, state));
  }
  for (const { chip, board, reads } of lone) put(board.id, await donorSummary(chip, board, reads, null, UNPAIRED));
  const result = new Map<string, BoardView[]>();
  for (const board of boards) {
    const original = boards.find((b) => b.driveId === board.driveId && b.role === "original");
    const fit = board.role === "donor" && original ? donorFit(original, board) : null;
    const view: BoardView = {
      id: board.id, role: board.role, boardNumber: board.boardNumber, revision: board.revision ?? null, controllerMarking: board.controllerMarking ?? null,
      motorDriverMarking: board.motorDriverMarking ?? null, condition: board.condition ?? null, dataInController: board.dataInController ?? false,
      fit: fit && { verdict: fit.verdict, differences: fit.differences, reason: board.fitReason ?? null }, chips: chips.get(board.id) ?? [],
    };
    result.set(board.driveId, [...(result.get(board.driveId) ?? []), view]);
  }
  return result;
}
