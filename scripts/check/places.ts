import type { Transaction } from "sequelize";
import { readName, seatingLetter, WORKSHOP_CHAIN } from "@/lib/core/words";
import { Board, Case, Chip, Drive, Read } from "@/models";

/** A read with all that names it and all that the log must agree with. */
export interface PlacedRead {
  id: string;
  driveId: string;
  name: string;
  sha256: string;
  sizeBytes: number;
  /** 8 lower-case hex digits */
  crc32: string;
}

export interface Places {
  driveIds: string[];
  chain(id: string): string;
  reads: PlacedRead[];
  /** of a chip: its drive's id */
  driveOfChip: Map<string, string>;
}

/** Names for everything, from one consistent look at the database. */
export async function findPlaces(tx: Transaction): Promise<Places> {
  const [cases, drives, boards, chips, reads] = await Promise.all([
    Case.findAll({ transaction: tx, raw: true }), Drive.findAll({ transaction: tx, raw: true }), Board.findAll({ transaction: tx, raw: true }),
    Chip.findAll({ transaction: tx, raw: true }),
    Read.findAll({ transaction: tx, raw: true, attributes: ["id", "chipId", "stage", "number", "sha256", "sizeBytes", "crc32"] }),
  ]);
  const refs = new Map(cases.map((row) => [row.id, row.ref]));
  const driveNames = new Map(drives.map((row) => [row.id, `Case ${refs.get(row.caseId) ?? row.caseId}, Drive ${letter(row.position)}`]));
  const boardsById = new Map(boards.map((row) => [row.id, row]));
  const chipsById = new Map(chips.map((row) => [row.id, row]));
  const driveOfChip = new Map(chips.map((row) => [row.id, boardsById.get(row.boardId)?.driveId ?? ""]));
  return {
    driveIds: drives.map((row) => row.id),
    chain: (id) => (id === WORKSHOP_CHAIN ? "Workshop log" : driveNames.get(id) ?? `Log ${id} of no known drive`),
    driveOfChip,
    reads: reads.map((row) => {
      const chip = chipsById.get(row.chipId);
      const side = chip && boardsById.get(chip.boardId)?.role === "donor" ? "Donor" : "Orig";
      const driveId = driveOfChip.get(row.chipId) ?? "";
      return {
        id: row.id, driveId, name: `${driveNames.get(driveId) ?? "No known drive"}, ${side} ${chip?.designator ?? "?"}, ${readName(row.stage, row.number)}`,
        sha256: row.sha256.toString("hex"), sizeBytes: row.sizeBytes, crc32: row.crc32.toString(16).padStart(8, "0"),
      };
    }),
  };
}

function letter(position: number): string {
  return seatingLetter(position);
}
