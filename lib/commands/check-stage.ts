import type { Stage } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { type Transaction, Transfer } from "@/models";
import type { ChipPlace } from "./place";

/**
 * The table "Stages" of PRODUCT.md: which stage fits which board, and when. Answers the transfer that an `after` read
 * belongs to, null for the other stages.
 */
export async function checkStage({ chip, board }: ChipPlace, stage: Stage, tx?: Transaction): Promise<string | null> {
  if ((stage === "before") !== (board.role === "original")) {
    const detail = board.role === "original"
      ? `${chip.designator} is on the original board: its reads have the stage before. Send this one to the donor's chip.`
      : `${chip.designator} is on the donor board: its reads have the stage donor (own content) or after (read-back). Send reads of the original to the original's chip.`;
    throw new AppError("does-not-fit", detail, { errors: [{ path: "stage", message: "Doesn't fit the board." }] });
  }
  if (stage === "before") return null;
  const latest = await Transfer.findOne({ where: { donorChipId: chip.id }, order: [["at", "DESC"]], transaction: tx });
  if (stage === "donor") {
    if (latest) throw new AppError("rule-against", `${chip.designator} has been written: what it holds now is no longer its own content. Send this as a read-back (stage after).`);
    return null;
  }
  if (!latest) throw new AppError("rule-against", `No transfer to ${chip.designator} is recorded yet. Record the write or the moved chip first, then send the read-back.`);
  return latest.id;
}
