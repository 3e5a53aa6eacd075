import { QueryTypes } from "sequelize";
import { driveLetter } from "@/lib/commands/place";
import { type ShelfChip, shelfNumber, type ShelfRow, shelfState } from "@/lib/core/shelf";
import { connection, type ShelfBoard, type Transaction } from "@/models";

export function chipsOfRow(row: Pick<ShelfBoard, "chips">): ShelfChip[] {
  return JSON.parse(row.chips) as ShelfChip[];
}

interface Placed {
  boardId: string;
  driveId: string;
  position: number;
  caseId: string;
  ref: string;
}

/** Rows as they are shown, with the cases that they are kept for or went to. */
export async function shelfRows(rows: readonly ShelfBoard[], tx?: Transaction): Promise<ShelfRow[]> {
  const [placed, refs] = await Promise.all([takers(rows.flatMap((row) => row.takenBoardId ?? []), tx), caseRefs(rows.flatMap((row) => row.reservedCaseId ?? []), tx)]);
  return rows.map((row) => {
    const taker = row.takenBoardId ? placed.get(row.takenBoardId) : undefined;
    return {
      id: row.id, number: shelfNumber(row.number), boardNumber: row.boardNumber, revision: row.revision ?? null, controllerMarking: row.controllerMarking ?? null, motorDriverMarking: row.motorDriverMarking ?? null,
      chips: chipsOfRow(row), origin: row.origin ?? null, condition: row.condition ?? null, place: row.place ?? null, note: row.note ?? null,
      state: shelfState({ taken: row.takenAt != null, retired: row.retiredAt != null, reserved: row.reservedCaseId != null }),
      reservedFor: row.reservedCaseId ? { caseId: row.reservedCaseId, ref: refs.get(row.reservedCaseId) ?? "" } : null,
      taken: taker && row.takenAt ? { at: row.takenAt.toISOString(), driveId: taker.driveId, letter: driveLetter(taker), caseId: taker.caseId, ref: taker.ref } : null,
      retired: row.retiredAt ? { at: row.retiredAt.toISOString(), reason: row.retiredReason ?? "" } : null,
      createdAt: row.createdAt.toISOString(),
    };
  });
}

async function takers(boardIds: string[], tx?: Transaction): Promise<Map<string, Placed>> {
  if (boardIds.length === 0) return new Map();
  const rows = await connection().query<Placed>(
    `SELECT boards.id AS boardId, drives.id AS driveId, drives.position, cases.id AS caseId, cases.ref FROM boards JOIN drives ON drives.id = boards.drive_id JOIN cases ON cases.id = drives.case_id WHERE boards.id IN (?)`,
    { replacements: [boardIds], type: QueryTypes.SELECT, transaction: tx },
  );
  return new Map(rows.map((row) => [row.boardId, row]));
}

async function caseRefs(ids: string[], tx?: Transaction): Promise<Map<string, string>> {
  if (ids.length === 0) return new Map();
  const rows = await connection().query<{ id: string; ref: string }>("SELECT id, ref FROM cases WHERE id IN (?)", { replacements: [[...new Set(ids)]], type: QueryTypes.SELECT, transaction: tx });
  return new Map(rows.map((row) => [row.id, row.ref]));
}
