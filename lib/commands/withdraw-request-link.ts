import type { Actor } from "@/lib/core/words";
import { inTransaction, Request } from "@/models";
import { appendToCase, lockCase } from "./append-to-case";
import { requestFor } from "./renew-request-link";

/** Ends the customer's private link at once, also of a closed case; a link that has ended stays as it is. */
export async function withdrawRequestLink(actor: Actor, requestId: string): Promise<void> {
  const known = await requestFor(actor, requestId);
  await inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, known.caseId);
    const request = (await Request.findByPk(requestId, { transaction: tx, lock: tx.LOCK.UPDATE }))!;
    if (request.expiresAt.getTime() <= Date.now()) return;
    await request.update({ expiresAt: new Date() }, { transaction: tx });
    await appendToCase(tx, chains, actor, "request.link-withdrawn", { type: "request", id: requestId }, { caseRef: found.ref, request: requestId });
  });
}
