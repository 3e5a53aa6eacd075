import { randomUUID } from "node:crypto";
import { erasureDay } from "@/lib/core/closing";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { returnedSubject, returnedText } from "@/lib/mail/returned-text";
import { keepDays } from "@/lib/queries/closing";
import { dayIn } from "@/lib/queries/workshop-day";
import type { ReturnInput } from "@/lib/schemas/closing";
import { CaseReturn, Customer, inTransaction } from "@/models";
import { appendToCase, lockCase } from "./append-to-case";
import { caseFor } from "./place";
import { queueMail } from "./queue-mail";
import { allow } from "./refuse";
import { requireOpen } from "./require-open";

/** What went back, to whom and how; the customer hears it by mail. Once a case. */
export async function returnCase(actor: Actor, caseId: string, input: ReturnInput): Promise<{ id: string; returnedAt: string }> {
  allow(actor, "case.return");
  await caseFor(actor, caseId);
  return inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, caseId);
    requireOpen(found);
    if (!found.receivedAt) throw new AppError("rule-against", `The parcel of case ${found.ref} has not come yet, so nothing can go back. Receive it first.`);
    if (await CaseReturn.findOne({ where: { caseId }, transaction: tx })) {
      throw new AppError("rule-against", `What went back for case ${found.ref} is recorded already. What follows later goes into a note on the case.`);
    }
    const at = new Date();
    const way = { carrier: input.carrier ?? null, tracking: input.tracking ?? null, sealNumber: input.sealNumber ?? null };
    const row = await CaseReturn.create({ id: randomUUID(), caseId, items: JSON.stringify(input.items), toPerson: input.toPerson, ...way, note: input.note ?? null, byUserId: actor.id, at }, { transaction: tx });
    await found.update({ returnedAt: at }, { transaction: tx });
    // to whom it went is the customer's name: it stands in the row, not in the log
    await appendToCase(tx, chains, actor, "case.returned", { type: "case", id: caseId }, { caseRef: found.ref, items: input.items, ...way, note: input.note ?? null });
    const customer = (await Customer.findByPk(found.customerId, { transaction: tx }))!;
    const { workshop, timeZone } = env();
    const eraseOn = new Date(`${erasureDay(dayIn(timeZone, at), await keepDays(caseId, tx))}T12:00:00Z`);
    const text = returnedText({ workshop, caseRef: found.ref, items: input.items, ...way, eraseOn: new Intl.DateTimeFormat("en-GB", { dateStyle: "long", timeZone: "UTC" }).format(eraseOn) });
    await queueMail(tx, { kind: "case-returned", to: customer.email, subject: returnedSubject(found.ref), text, maskedText: text });
    return { id: row.id, returnedAt: at.toISOString() };
  });
}
