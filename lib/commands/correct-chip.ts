import { UniqueConstraintError } from "sequelize";
import { NO_CHIP_REFUSAL } from "@/lib/core/no-chip";
import { type Actor, SYSTEM } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { ChipCorrection } from "@/lib/schemas/chip";
import { Chip, inTransaction, type Transaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { changesOf } from "./correct-facts";
import { judgeChip } from "./judge-read";
import { pairChip } from "./pair-chip";
import { chipFor, placeOfChip } from "./place";
import { allow } from "./refuse";
import { requireOpen } from "./require-open";
import { revokeStanding } from "./revoke-approval";

/** Corrects what was typed about a chip; its reads are judged again and an approval that stood on the old facts falls. */
export async function correctChip(actor: Actor, chipId: string, input: ChipCorrection): Promise<{ id: string }> {
  allow(actor, "fact.correct");
  const { drive } = await chipFor(actor, chipId);
  const { pairedWith, supplyMillivolts, ...rest } = input.changes;
  const wanted = { ...rest, ...(supplyMillivolts === undefined ? {} : { supplyMillivolts: supplyMillivolts === "unknown" ? null : supplyMillivolts }) };
  try {
    return await inTransaction(async (tx) => {
      await lockChain(tx, drive.id);
      const place = await placeOfChip(chipId, tx);
      const { chip, board } = place;
      requireOpen(place.case);
      if (board.dataInController && wanted.needsTransfer === true) throw new AppError("rule-against", NO_CHIP_REFUSAL);
      const changes = changesOf(chip, wanted);
      const repair = pairedWith !== undefined && (pairedWith ?? null) !== (chip.pairedWithId ?? null);
      if (changes.length === 0 && !repair) throw new AppError("does-not-fit", "Nothing would change: these are the values on record.");
      if (repair && board.role !== "donor") throw new AppError("does-not-fit", "Pairing is set on the donor's chip: open that one.");
      const sizeChanges = changes.some((c) => c.field === "sizeBytes");
      if (repair) changes.push({ field: "pairedWith", from: await nameOf(tx, chip.pairedWithId), to: await nameOf(tx, pairedWith) });
      if (changes.length > 0) {
        await chip.update(wanted, { transaction: tx });
        await appendEntry(tx, drive.id, actor, "chip.corrected", { type: "chip", id: chip.id }, { chip: { id: chip.id, designator: chip.designator }, changes, reason: input.reason });
      }
      const originalId = board.role === "original" ? chip.id : chip.pairedWithId;
      if (originalId && sizeChanges) {
        await revokeStanding(tx, SYSTEM, originalId, "size-changed", `The size of ${chip.designator} was corrected.`);
      }
      if (repair) await pairChip(tx, actor, { donorChip: chip, donorBoard: board, driveId: drive.id, originalChipId: pairedWith ?? null });
      // where a chip sits on a picture says nothing about its reads
      if (repair || changes.some((c) => c.field !== "placeX" && c.field !== "placeY")) await judgeChip(tx, place);
      return { id: chip.id };
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new AppError("rule-against", "Another chip of this board has that designator.");
    throw error;
  }
}

/** "original U12": a board has each designator once, so that the log says which chip without the database. */
async function nameOf(tx: Transaction, originalId: string | null | undefined): Promise<string | null> {
  const original = originalId ? await Chip.findByPk(originalId, { transaction: tx }) : null;
  return original && `original ${original.designator}`;
}
