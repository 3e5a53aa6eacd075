import { randomUUID } from "node:crypto";
import { Op } from "sequelize";
import { readCaseRef, withCheck } from "@/lib/core/case-number";
import { erasureCause, erasureRefusal, longDay } from "@/lib/core/erasure";
import { type Actor, type EraseCause, WORKSHOP_CHAIN } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { erasedMailSubject, erasedMailText } from "@/lib/mail/erasure-text";
import { erasureFacts, type ErasureItem, erasureItems } from "@/lib/queries/erasure-items";
import { dayIn } from "@/lib/queries/workshop-day";
import type { ErasureInput } from "@/lib/schemas/erasure";
import { Customer, Drive, Erasure, Image, inTransaction, Request, type Transaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { appendToCase, lockCase } from "./append-to-case";
import { chainIsClean } from "./chain-gate";
import { removeErased } from "./erased-image";
import { caseFor } from "./place";
import { queueMail } from "./queue-mail";
import { allow } from "./refuse";

export interface Erased {
  id: string;
  cause: EraseCause;
  /** how many went, and how many stay because they are used elsewhere too */
  images: number;
  photos: number;
  bytes: number;
  kept: number;
}

export interface EraseOptions {
  /** called before each step, by its name: tests end the work there as a crash would */
  at?: (step: "entered" | "committed" | "removed") => void | Promise<void>;
}

/**
 * Gives up the stored bytes of a closed case, for good. Entries and rows come first, in one transaction; then the files go.
 * Whatever a crash leaves of them is taken away at the next start (finishErasures). Digests stay, always.
 */
export async function eraseImages(actor: Actor, caseId: string, input: ErasureInput, { at }: EraseOptions = {}): Promise<Erased> {
  allow(actor, "case.erase");
  const { ref } = await caseFor(actor, caseId);
  checkTyped(ref, input.caseRef);
  let digests: string[] = [];
  const erased = await inTransaction(async (tx) => {
    const { answer, goes } = await erase(tx, actor, caseId, input.reason);
    digests = goes.map((item) => item.sha256);
    await at?.("entered");
    return answer;
  });
  await at?.("committed");
  for (const sha256 of digests) {
    await removeErased(sha256).catch((error: unknown) => console.error(`the file of the erased image ${sha256} is still there and is taken away at the next start:`, (error as Error).message));
    await at?.("removed");
  }
  return erased;
}

function checkTyped(ref: string, typed: string): void {
  const reading = readCaseRef(typed);
  if (reading.kind === "ref" && reading.ref === ref) return;
  const detail = reading.kind === "ref" ? `You typed ${reading.ref}, and this is case ${ref}. Nothing was erased: check which case you mean.` : `Type the number of this case, ${ref}. Nothing was erased.`;
  throw new AppError("does-not-fit", detail, { errors: [{ path: "caseRef", message: detail }] });
}

/** The reason in the log of a case that was erased before and shared the bytes. */
const SHARED = "The images of this case were erased before. These bytes stayed for another case, and that one is erased now, too.";

/** Every log that has to speak of it: those of this case, and of cases erased before that used the same bytes. */
const chainsOf = (items: readonly ErasureItem[]) => items.flatMap((item) => item.uses.map((use) => use.driveId ?? WORKSHOP_CHAIN));

async function erase(tx: Transaction, actor: Actor, caseId: string, reason: string): Promise<{ answer: Erased; goes: ErasureItem[] }> {
  const before = await erasureItems(caseId);
  const drives = await Drive.findAll({ where: { caseId }, attributes: ["id"], transaction: tx });
  for (const chain of [...new Set([...drives.map((drive) => drive.id), ...chainsOf(before.goes)])].sort()) await lockChain(tx, chain);
  const { found, chains } = await lockCase(tx, caseId);
  const { goes, stays } = await erasureItems(caseId, tx);
  const facts = await erasureFacts(found, { images: goes.length, kept: stays.length }, tx);
  const refusal = erasureRefusal(facts);
  if (refusal) throw new AppError("rule-against", refusal);
  for (const chain of chains) {
    if (await chainIsClean(chain, tx)) continue;
    throw new AppError("rule-against", `${chain === WORKSHOP_CHAIN ? "The workshop’s log" : "The custody log of a drive of this case"} doesn’t check out. Nothing is erased while it may be needed to find out why: have an auditor record an assessment first.`);
  }
  const [id, at, cause] = [randomUUID(), new Date(), erasureCause(facts)];
  for (const item of goes) {
    await Image.update({ state: "erased", erasedAt: at, erasedCause: cause }, { where: { sha256: Buffer.from(item.sha256, "hex") }, transaction: tx });
    for (const chain of [...new Set(chainsOf([item]))].sort()) {
      const names = item.uses.filter((use) => (use.driveId ?? WORKSHOP_CHAIN) === chain).map((use) => use.name);
      await appendEntry(tx, chain, actor, "image.erased", { type: "image", id: chain }, {
        // what was typed about this case is nobody's business in another case's log
        sha256: item.sha256, sizeBytes: item.sizeBytes, names, cause, reason: chains.includes(chain) ? reason : SHARED, erasure: id,
      });
    }
  }
  const [photos, bytes] = [goes.filter((item) => item.photo).length, goes.reduce((sum, item) => sum + item.sizeBytes, 0)];
  const answer: Erased = { id, cause, images: goes.length - photos, photos, bytes, kept: stays.length };
  await appendToCase(tx, chains, actor, "case.erased", { type: "case", id: caseId }, {
    caseRef: found.ref, erasure: id, cause, reason, images: answer.images, photos, bytes, kept: stays.map(({ sha256, names }) => ({ sha256, names })),
  });
  const list = (items: ErasureItem[]) => JSON.stringify(items.map(({ sha256, sizeBytes, names }) => ({ sha256, sizeBytes, names })));
  await Erasure.create({ id, caseId, cause, reason, erased: list(goes), kept: list(stays), images: answer.images, photos, bytes, byUserId: actor.id, at }, { transaction: tx });
  await found.update({ erasedAt: at }, { transaction: tx });
  await Request.update({ deletionAnsweredAt: at, deletionAnsweredBy: actor.id }, { where: { caseId, deletionAnsweredAt: null, deletionAskedAt: { [Op.ne]: null } }, transaction: tx });
  // a customer who asked hears of it in any case
  if (goes.length > 0 || cause === "asked-for") await tellCustomer(tx, found.customerId, { caseRef: withCheck(found.ref), cause, images: answer.images, photos, kept: answer.kept, at });
  return { answer, goes };
}

async function tellCustomer(tx: Transaction, customerId: string, facts: { caseRef: string; cause: EraseCause; images: number; photos: number; kept: number; at: Date }): Promise<void> {
  const customer = (await Customer.findByPk(customerId, { transaction: tx }))!;
  const { workshop, timeZone } = env();
  const text = erasedMailText({ ...facts, workshop, day: longDay(dayIn(timeZone, facts.at)) });
  await queueMail(tx, { kind: "case-erased", to: customer.email, subject: erasedMailSubject(facts.caseRef), text, maskedText: text });
}
