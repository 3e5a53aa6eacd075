import { randomBytes } from "node:crypto";
import type { Actor } from "@/lib/core/words";
import { shareHash } from "@/lib/queries/open-share";
import { Customer, inTransaction, Request } from "@/models";
import { appendToCase, lockCase } from "./append-to-case";
import { allow, allowCase, notFound } from "./refuse";
import { NO_END } from "./request-transfer";
import { requireOpen } from "./require-open";
import { mailPrivateLink } from "./tell-of-request";

/** A request behind its id, as far as this actor may know of it. */
export async function requestFor(actor: Actor, id: string): Promise<Request> {
  allow(actor, "request.answer");
  const known = await Request.findByPk(id);
  if (!known) throw notFound("request");
  allowCase(actor, known.caseId, "request");
  return known;
}

/** Sends the customer a new private link; the former one ends in the same moment. */
export async function renewRequestLink(actor: Actor, requestId: string): Promise<void> {
  const known = await requestFor(actor, requestId);
  await inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, known.caseId);
    requireOpen(found);
    const token = randomBytes(32).toString("base64url");
    await Request.update({ tokenHash: shareHash(token), expiresAt: NO_END }, { where: { id: requestId }, transaction: tx });
    await appendToCase(tx, chains, actor, "request.link-sent", { type: "request", id: requestId }, { caseRef: found.ref, request: requestId });
    const customer = (await Customer.findByPk(found.customerId, { transaction: tx }))!;
    await mailPrivateLink(tx, found, customer, token, true);
  });
}
