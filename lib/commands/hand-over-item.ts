import { randomUUID } from "node:crypto";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { itemsOf } from "@/lib/queries/items";
import type { HandOverInput } from "@/lib/schemas/hand-over";
import { HandOver, inTransaction, User } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { driveFor } from "./place";
import { allow, notFound } from "./refuse";

/** An item goes from person and place to person and place. It counts as theirs once they have confirmed. */
export async function handOverItem(actor: Actor, driveId: string, input: HandOverInput): Promise<{ id: string }> {
  allow(actor, "item.hand-over");
  const { drive } = await driveFor(actor, driveId);
  const { item: asked, from, to, condition } = input;
  return inTransaction(async (tx) => {
    await lockChain(tx, driveId);
    const item = (await itemsOf(drive, tx)).find((one) => one.id === asked.id && one.type === asked.type);
    if (!item) throw notFound(asked.type);
    if (await HandOver.findOne({ where: { itemId: item.id, confirmedAt: null }, transaction: tx })) {
      throw new AppError("rule-against", `${item.name} is on its way already. Its receiver confirms first, or somebody says that it did not arrive.`);
    }
    const given = { person: to.person, place: to.place };
    if (from.person === given.person && from.place === given.place) throw new AppError("does-not-fit", "Person and place stay the same, so nothing changes hands. Change one of them.", { errors: [{ path: "to", message: "Change person or place." }] });
    if (to.userId) await checkReceiver(to.userId);
    const sealNumber = input.sealNumber ?? null;
    const note = input.note ?? null;
    const row = await HandOver.create({
      id: randomUUID(), driveId, itemType: item.type, itemId: item.id, fromPerson: from.person, fromPlace: from.place, toPerson: to.person, toPlace: to.place,
      toUserId: to.userId ?? null, itemCondition: condition, sealNumber, note, givenBy: actor.id, givenAt: new Date(),
    }, { transaction: tx });
    await appendEntry(tx, driveId, actor, "item.handed-over", { type: "item", id: item.id }, { handOver: row.id, item, from, to: given, condition, sealNumber, note });
    return { id: row.id };
  });
}

async function checkReceiver(userId: string): Promise<void> {
  const user = await User.findByPk(userId);
  if (!user || user.disabledAt || !["technician", "lead"].includes(user.role)) {
    throw new AppError("does-not-fit", "The receiver has no account that could confirm. Choose somebody else, or leave the account out and record how they confirmed.", { errors: [{ path: "to.userId", message: "Choose a technician or a lead." }] });
  }
}
