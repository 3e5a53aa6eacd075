import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { itemsOf } from "@/lib/queries/items";
import type { ConfirmationInput } from "@/lib/schemas/hand-over";
import { HandOver, inTransaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { driveFor } from "./place";
import { allow, notFound } from "./refuse";

/**
 * The receiver confirms, or somebody says that the item did not arrive. Who has an account here confirms with it; for
 * anybody else (a customer, a carrier) somebody of the bench writes down how they confirmed.
 */
export async function confirmHandOver(actor: Actor, id: string, input: ConfirmationInput): Promise<{ id: string; received: boolean }> {
  allow(actor, "item.confirm");
  const known = await HandOver.findByPk(id);
  if (!known) throw notFound("hand-over");
  const { drive } = await driveFor(actor, known.driveId);
  return inTransaction(async (tx) => {
    await lockChain(tx, drive.id);
    const row = (await HandOver.findByPk(id, { transaction: tx }))!;
    if (row.confirmedAt) throw new AppError("rule-against", "This hand-over is confirmed already.");
    const text = input.text ?? null;
    if (input.received) checkMayConfirm(actor, row, text);
    else if (row.toUserId !== actor.id && row.givenBy !== actor.id && actor.role !== "lead") {
      throw new AppError("forbidden", "Who gave it, who should have it, or a lead can say that it did not arrive.");
    }
    const item = (await itemsOf(drive, tx)).find((one) => one.id === row.itemId)!;
    await row.update({ received: input.received, confirmedBy: actor.id, confirmedAt: new Date(), confirmation: text }, { transaction: tx });
    const parties = { from: { person: row.fromPerson, place: row.fromPlace }, to: { person: row.toPerson, place: row.toPlace } };
    if (input.received) {
      await appendEntry(tx, drive.id, actor, "item.received", { type: "item", id: item.id }, { handOver: id, item, ...parties, condition: row.itemCondition, sealNumber: row.sealNumber, confirmation: text });
    } else {
      await appendEntry(tx, drive.id, actor, "item.not-received", { type: "item", id: item.id }, { handOver: id, item, ...parties, reason: text! });
    }
    return { id, received: input.received };
  });
}

function checkMayConfirm(actor: Actor, row: HandOver, text: string | null): void {
  if (row.toUserId !== null && row.toUserId !== actor.id) throw new AppError("forbidden", `${row.toPerson} confirms this, signed in with their own account.`);
  if (row.toUserId === null && !text) {
    throw new AppError("does-not-fit", `${row.toPerson} has no account here. Write how they confirmed, such as "signed the return slip".`, { errors: [{ path: "text", message: "Write how it was confirmed." }] });
  }
}
