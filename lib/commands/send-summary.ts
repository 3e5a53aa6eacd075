import { randomBytes, randomUUID } from "node:crypto";
import { deriveChipState } from "@/lib/core/chip-state";
import { driveLabel } from "@/lib/core/drive-label";
import type { Actor, Policy } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { summarySubject, summaryText } from "@/lib/mail/summary-text";
import { stateFacts } from "@/lib/queries/chip-facts";
import { type ChipRecord, chipRecords } from "@/lib/queries/chip-records";
import { shareHash } from "@/lib/queries/open-share";
import { people } from "@/lib/queries/people";
import { currentPolicy } from "@/lib/queries/policy";
import { shareView } from "@/lib/queries/share-view";
import { summaryFacts } from "@/lib/queries/summary";
import type { ShareView } from "@/lib/views";
import { Customer, Drive, inTransaction, Share } from "@/models";
import { logKey } from "@/storage";
import { appendEntry, lockChain } from "./append-entry";
import { requireCleanChain } from "./chain-gate";
import { makeSeal } from "./make-seal";
import { caseFor, driveLetter } from "./place";
import { queueMail } from "./queue-mail";
import { allow } from "./refuse";

const DAY_MS = 86_400_000;
const MASK = "(private link, hidden)";

/** Makes a private link to the case's summary and sends it to the customer, once every chip that needs transfer is verified. */
export async function sendSummary(actor: Actor, caseId: string): Promise<{ share: ShareView }> {
  allow(actor, "summary.send");
  const found = await caseFor(actor, caseId);
  for (const drive of await Drive.findAll({ where: { caseId } })) await requireCleanChain(drive.id);
  return inTransaction(async (tx) => {
    const drives = await Drive.findAll({ where: { caseId }, order: ["position"], transaction: tx });
    const inOrder = drives.map((d) => d.id).sort();
    for (const id of inOrder) await lockChain(tx, id);
    const policy = await currentPolicy(tx);
    const { records } = await chipRecords(inOrder, tx);
    requireVerified(records, policy);
    const customer = (await Customer.findByPk(found.customerId, { transaction: tx }))!;
    const token = randomBytes(32).toString("base64url");
    const now = new Date();
    const share = await Share.create({
      id: randomUUID(), caseId, tokenHash: shareHash(token), email: customer.email, createdBy: actor.id, createdAt: now,
      expiresAt: new Date(now.getTime() + policy.shareDays * DAY_MS),
    }, { transaction: tx });
    const heads = new Map<string, { seq: number; hash: string }>();
    for (const id of inOrder) {
      heads.set(id, await appendEntry(tx, id, actor, "summary.sent", { type: "share", id: share.id }, {
        caseRef: found.ref, share: share.id, expiresAt: share.expiresAt.toISOString(),
      }));
    }
    // over the very heads that the mail names
    const seal = await makeSeal(actor, "summary", tx);
    const facts = await summaryFacts(caseId, drives, records, policy, tx);
    const text = (link: string) => summaryText({
      workshop: env().workshop, caseRef: found.ref, link, expiresAt: share.expiresAt, timeZone: env().timeZone,
      summary: facts,
      drives: drives.map((d) => ({ letter: driveLetter(d), label: driveLabel(d), head: heads.get(d.id)! })), logKeyId: logKey().keyId, seal,
    });
    const page = `${env().publicUrl}/summary/`;
    await queueMail(tx, { kind: "summary", to: customer.email, subject: summarySubject(found.ref), text: text(`${page}${token}`), maskedText: text(`${page}${MASK}`) });
    return { share: shareView(share, await people(tx)) };
  });
}

function requireVerified(records: ChipRecord[], policy: Policy): void {
  const needed = records.filter((r) => r.chip.needsTransfer);
  if (needed.length === 0) throw new AppError("rule-against", "This case has no chip that needs transfer yet, so there is nothing to tell the customer. Record the chip first.");
  for (const record of needed) {
    const { state, label } = deriveChipState(stateFacts(record, policy));
    if (state === "verified") continue;
    throw new AppError("rule-against", `${record.chip.designator} of Drive ${driveLetter(record.drive)} is not verified yet (${label}). Finish it; the summary goes out when every chip that needs transfer is verified.`);
  }
}
