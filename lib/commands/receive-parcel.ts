import { randomUUID } from "node:crypto";
import { differsText } from "@/lib/core/receipt-words";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { parcelSubject, parcelText } from "@/lib/mail/parcel-text";
import type { ReceiptInput } from "@/lib/schemas/receipt";
import { type Case, Customer, inTransaction, Receipt, type Transaction } from "@/models";
import { appendToCase, lockCase } from "./append-to-case";
import { caseFor } from "./place";
import { queueMail } from "./queue-mail";
import { allow } from "./refuse";
import { requireOpen } from "./require-open";

/**
 * The parcel is here: what it is like beside what was asked for. From now on drives can be recorded. A case made at the
 * desk has been received already; it takes its receipt once as well, and keeps its time.
 */
export async function receiveParcel(actor: Actor, caseId: string, input: ReceiptInput): Promise<{ id: string; receivedAt: string }> {
  allow(actor, "parcel.receive");
  await caseFor(actor, caseId);
  return inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, caseId);
    requireOpen(found);
    await refuseSecond(found, tx);
    const now = new Date();
    const requested = found.receivedAt === null;
    const receivedAt = found.receivedAt ?? now;
    const receipt = await Receipt.create({
      id: randomUUID(), caseId, carrier: input.carrier ?? null, tracking: input.tracking ?? null, sealAsSent: input.sealAsSent, sealNumber: input.sealNumber ?? null,
      smallBoard: input.smallBoard, parcelCondition: input.parcelCondition, accessories: input.accessories ?? null,
      differs: differsText(input.lines ?? [], input.differs), byUserId: actor.id, at: now,
    }, { transaction: tx });
    if (requested) await found.update({ receivedAt }, { transaction: tx });
    await appendToCase(tx, chains, actor, "parcel.received", { type: "case", id: caseId }, {
      caseRef: found.ref, receipt: receipt.id, carrier: receipt.carrier ?? null, tracking: receipt.tracking ?? null, sealAsSent: receipt.sealAsSent, sealNumber: receipt.sealNumber ?? null,
      smallBoard: receipt.smallBoard, condition: receipt.parcelCondition, accessories: receipt.accessories ?? null, differs: receipt.differs ?? null,
    });
    await setDueDay(tx, chains, actor, found, input.dueOn ?? null);
    // whoever stood at the desk knows that it is here
    if (requested) await tellCustomer(found, receivedAt, tx);
    return { id: receipt.id, receivedAt: receivedAt.toISOString() };
  });
}

/** The day that was agreed on, where it is told with the parcel; a day that stands already is no change. */
async function setDueDay(tx: Transaction, chains: readonly string[], actor: Actor, found: Case, dueOn: string | null): Promise<void> {
  const from = found.dueOn ?? null;
  if (dueOn === null || dueOn === from) return;
  await found.update({ dueOn }, { transaction: tx });
  await appendToCase(tx, chains, actor, "case.corrected", { type: "case", id: found.id }, { caseRef: found.ref, changes: [{ field: "dueOn", from, to: dueOn }], reason: "Agreed on when the parcel was received." });
}

async function refuseSecond(found: Case, tx: Transaction): Promise<void> {
  if (await Receipt.findOne({ where: { caseId: found.id }, transaction: tx })) {
    throw new AppError("rule-against", `The parcel of case ${found.ref} has been received already. See its receipt; what came later goes into a note on the case.`);
  }
}

async function tellCustomer(found: Case, at: Date, tx: Transaction): Promise<void> {
  const customer = (await Customer.findByPk(found.customerId, { transaction: tx }))!;
  const text = parcelText({ workshop: env().workshop, caseRef: found.ref, receivedAt: at, timeZone: env().timeZone });
  await queueMail(tx, { kind: "parcel-received", to: customer.email, subject: parcelSubject(found.ref), text, maskedText: text });
}
