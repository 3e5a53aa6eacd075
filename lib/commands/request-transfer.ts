import { randomUUID } from "node:crypto";
import { withCheck } from "@/lib/core/case-number";
import { rfc8785 } from "@/lib/core/canonical";
import { CONSENT_FIELD, CONSENTS, DAMAGE_SAID } from "@/lib/core/request-words";
import { SYSTEM, WORKSHOP_CHAIN } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { shareHash } from "@/lib/queries/open-share";
import { currentPolicy } from "@/lib/queries/policy";
import type { RequestAnswers } from "@/lib/schemas/request";
import { Case, Customer, inTransaction, Request, type Transaction } from "@/models";
import { addPhotosForRequest, type PhotoFile, readyPhotos } from "./add-photos";
import { appendEntry } from "./append-entry";
import { nextCaseRef } from "./next-case-ref";
import { requireRequestRoom } from "./request-room";
import { tellOfRequest } from "./tell-of-request";

/** No end of its own: the link ends some days after the case is closed. */
export const NO_END = new Date("9999-12-31T00:00:00Z");

export interface Requester {
  /** the private link's secret; only its hash is stored */
  token: string;
  address: Buffer;
}

export interface MadeRequest {
  caseId: string;
  ref: string;
  refChecked: string;
}

/** A customer asks for a transfer: customer, case, answers, photos, entry and mails in one step. Nobody of the workshop did it. */
export async function requestTransfer(answers: RequestAnswers, files: PhotoFile[], { token, address }: Requester): Promise<MadeRequest> {
  const photos = await readyPhotos(files);
  return inTransaction(async (tx) => {
    const now = new Date();
    // the counter's lock makes the counts below exact: requests at once wait here for one another
    const ref = await nextCaseRef(tx, now);
    await requireRequestRoom(address, tx);
    await requireSameDays(answers, tx);
    const customer = await Customer.create({
      id: randomUUID(), name: answers.name, email: answers.email, phone: answers.phone ?? null, company: answers.company ?? null, returnAddress: answers.returnAddress, createdAt: now,
    }, { transaction: tx });
    const damage = DAMAGE_SAID[answers.damage];
    const made = await Case.create({
      id: randomUUID(), ref, customerId: customer.id, damage: answers.happened ? `${damage}: ${answers.happened}` : damage, receivedAt: null, createdBy: null, requestedAt: now,
    }, { transaction: tx });
    const request = await Request.create({
      id: randomUUID(), caseId: made.id, tokenHash: shareHash(token), answers: rfc8785(JSON.parse(JSON.stringify(answers))), addressDigest: address, requestedAt: now, expiresAt: NO_END,
    }, { transaction: tx });
    // what happened in the customer's own words stays out of the log: it may name people
    await appendEntry(tx, WORKSHOP_CHAIN, SYSTEM, "request.received", { type: "request", id: request.id }, {
      caseRef: ref, request: request.id, damage, consents: CONSENTS.filter((consent) => answers[CONSENT_FIELD[consent] as keyof RequestAnswers] === "yes"), photos: photos.length,
    });
    await addPhotosForRequest(tx, made, photos);
    await tellOfRequest(tx, made, customer, { token, photos: photos.length, damage });
    return { caseId: made.id, ref, refChecked: withCheck(ref) };
  });
}

async function requireSameDays(answers: RequestAnswers, tx: Transaction): Promise<void> {
  const { erasureDays } = await currentPolicy(tx);
  if (answers.keepDays === erasureDays) return;
  const message = `We now keep images for ${erasureDays} days, not ${answers.keepDays}. Load the page again, read the line and tick it once more; what you typed stays.`;
  throw new AppError("does-not-fit", message, { errors: [{ path: "consentRead", message }] });
}
