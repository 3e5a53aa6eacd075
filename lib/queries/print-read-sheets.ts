import { withCheck } from "@/lib/core/case-number";
import { crc32Hex } from "@/lib/core/digest";
import { encryptionCaution } from "@/lib/core/encryption";
import { notFound } from "@/lib/commands/refuse";
import type { Actor, Stage } from "@/lib/core/words";
import type { ReadSheetView } from "@/lib/views";
import { Read } from "@/models";
import { caseView } from "./cases";
import { people } from "./people";

/** A sheet for each chip of the case, or for one: what was read so far, and room for what is written by hand. */
export async function printReadSheets(actor: Actor, caseId: string, of?: string): Promise<ReadSheetView[]> {
  const view = await caseView(actor, caseId);
  const chips = view.drives.flatMap((drive) => drive.boards.flatMap((board) => board.chips.map((chip) => ({ drive, board, chip })))).filter(({ chip }) => !of || chip.id === of);
  if (of && chips.length === 0) throw notFound("chip of this case");
  const reads = await Read.findAll({ where: { chipId: chips.map(({ chip }) => chip.id) }, order: ["stage", "number"] });
  const who = await people();
  return chips.map(({ drive, board, chip }) => ({
    key: chip.id, refChecked: withCheck(view.ref), driveLetter: drive.letter, board: board.role, boardNumber: board.boardNumber, revision: board.revision,
    designator: chip.designator, bus: chip.bus, package: chip.package, marking: chip.marking, sizeBytes: chip.sizeBytes, supplyMillivolts: chip.supplyMillivolts,
    encrypted: encryptionCaution(drive.encryption) !== null,
    stages: (board.role === "original" ? ["before"] as Stage[] : ["donor", "after"] as Stage[]).map((stage) => ({
      stage,
      reads: reads.filter((r) => r.chipId === chip.id && r.stage === stage).map((r) => ({
        number: r.number, seating: r.seating, reader: r.reader, supplyMillivolts: r.supplyMillivolts ?? null, crc32: crc32Hex(r.crc32),
        sha256: r.sha256.toString("hex"), operator: who(r.operatorId).name, at: (r.takenAt ?? r.storedAt).toISOString(), counted: r.counted,
      })),
    })),
  }));
}
