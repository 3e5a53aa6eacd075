import { withCheck } from "@/lib/core/case-number";
import { SYSTEM } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { DELETION_ANSWER_DAYS } from "@/lib/limits";
import { deletionSubject, deletionText } from "@/lib/mail/request-text";
import { openRequest } from "@/lib/queries/open-request";
import { inTransaction, Request } from "@/models";
import { appendToCase, lockCase } from "./append-to-case";
import { queueAlarm } from "./queue-alarm";
import { notFound } from "./refuse";

const DAY_MS = 86_400_000;

/** By when a lead answers a customer who asked for deletion. */
export const deletionAnswerBy = (askedAt: Date) => new Date(askedAt.getTime() + DELETION_ANSWER_DAYS * DAY_MS);

/** The customer asks for deletion; a closed case takes it too. Nothing is erased by it: a lead decides and answers. */
export async function askDeletion(token: string, message: string | null): Promise<void> {
  const open = await openRequest(token);
  if (!open) throw notFound("request");
  await inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, open.case.id);
    const request = (await Request.findByPk(open.request.id, { transaction: tx, lock: tx.LOCK.UPDATE }))!;
    if (request.deletionAskedAt) throw new AppError("rule-against", "You have asked for deletion already. Load the page again: it says by when a lead answers, or what was answered.");
    const now = new Date();
    await request.update({ deletionAskedAt: now, deletionMessage: message }, { transaction: tx });
    await appendToCase(tx, chains, SYSTEM, "request.deletion-asked", { type: "request", id: request.id }, { caseRef: found.ref, request: request.id });
    const { workshop, publicUrl, timeZone } = env();
    const refChecked = withCheck(found.ref);
    const answerBy = new Intl.DateTimeFormat("en-GB", { dateStyle: "long", timeZone }).format(deletionAnswerBy(now));
    await queueAlarm(tx, { kind: "request-deletion", roles: ["lead"], caseId: found.id, subject: deletionSubject(refChecked), text: deletionText({ workshop, refChecked, answerBy, link: `${publicUrl}/cases/${found.id}` }) });
  });
}
