import { Op } from "sequelize";
import { ENGINE_VERSION } from "@/lib/core/engine-version";
import { connection, inTransaction, Read } from "@/models";
import { lockChain } from "./append-entry";
import { judge } from "./judge-read";
import { placeOfChip } from "./place";

/**
 * After the engine has changed: every read that an older one judged is judged again, one transaction each, oldest first.
 * What the older one said stays in the log. A read whose image is gone or was erased keeps what was said of it. Answers how many.
 */
export async function judgeAgain(): Promise<number> {
  const old = await Read.findAll({ attributes: ["id", "chipId"], where: { engineVersion: { [Op.ne]: ENGINE_VERSION }, sha256: { [Op.notIn]: connection().literal("(SELECT sha256 FROM images WHERE state = 'erased')") } }, order: ["storedAt"] });
  let judged = 0;
  for (const { id, chipId } of old) {
    try {
      const { drive } = await placeOfChip(chipId);
      await inTransaction(async (tx) => {
        await lockChain(tx, drive.id);
        await judge(tx, await placeOfChip(chipId, tx), (await Read.findByPk(id, { transaction: tx }))!);
      });
      judged += 1;
    } catch (error) {
      console.error(`read ${id} could not be judged again:`, (error as Error).message);
    }
  }
  return judged;
}
