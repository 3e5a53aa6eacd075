/** "BX 40-3179 rev C": the number printed on a board with its revision, however that was typed. */
export function boardName(board: { boardNumber: string; revision: string | null }): string {
  return board.revision ? `${board.boardNumber} ${/^rev/i.test(board.revision) ? board.revision : `rev ${board.revision}`}` : board.boardNumber;
}
