import { withCheck } from "@/lib/core/case-number";
import { dueDay, longDay } from "@/lib/core/erasure";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { deletionAnswerSubject, deletionAnswerText } from "@/lib/mail/erasure-text";
import { dayIn } from "@/lib/queries/workshop-day";
import type { DeletionAnswerInput } from "@/lib/schemas/erasure";
import { Customer, inTransaction } from "@/models";
import { appendToCase, lockCase } from "./append-to-case";
import { queueMail } from "./queue-mail";
import { requestFor } from "./renew-request-link";

/** A lead tells the customer why their images can't be erased yet; the wish stays on record. The other answer is the erasure. */
export async function answerDeletion(actor: Actor, requestId: string, { answer }: DeletionAnswerInput): Promise<{ answeredAt: string }> {
  const request = await requestFor(actor, requestId);
  return inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, request.caseId);
    await request.reload({ transaction: tx, lock: tx.LOCK.UPDATE });
    const { workshop, timeZone } = env();
    const day = (at: Date) => longDay(dayIn(timeZone, at));
    if (!request.deletionAskedAt) throw new AppError("rule-against", `The customer of case ${found.ref} has not asked for deletion. There is nothing to answer.`);
    if (request.deletionAnsweredAt) throw new AppError("rule-against", `The customer of case ${found.ref} was answered on ${day(request.deletionAnsweredAt)} already. Write to them by mail if there is more to say.`);
    const now = new Date();
    await request.update({ deletionAnsweredAt: now, deletionAnswer: answer, deletionAnsweredBy: actor.id }, { transaction: tx });
    await appendToCase(tx, chains, actor, "request.deletion-answered", { type: "request", id: request.id }, { caseRef: found.ref, request: request.id, answer });
    const due = dueDay({ eraseOn: found.eraseOn ?? null, keptUntil: found.keptUntil ?? null });
    const refChecked = withCheck(found.ref);
    const text = deletionAnswerText({ workshop, caseRef: refChecked, answer, askedOn: day(request.deletionAskedAt), eraseOn: due ? longDay(due) : null });
    const customer = (await Customer.findByPk(found.customerId, { transaction: tx }))!;
    await queueMail(tx, { kind: "deletion-answer", to: customer.email, subject: deletionAnswerSubject(refChecked), text, maskedText: text });
    return { answeredAt: now.toISOString() };
  });
}
