import { createHash } from "node:crypto";
import { canonicalJson } from "@/lib/core/canonical";
import { sealProof } from "@/lib/core/seal";
import type { Actor } from "@/lib/core/words";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { currentPolicy } from "@/lib/queries/policy";
import type { ReportCase, ReportDrawing } from "@/lib/report/report-facts";
import { CustodyHead, Drive, inTransaction, type Transaction } from "@/models";
import { logKey, sealKey } from "@/storage";
import { appendEntry, lockChain } from "./append-entry";
import { type BundleImage, recordOfCase } from "./bundle-case";
import { drawingOf } from "./bundle-report";
import { sealNow } from "./make-seal";
import { caseFor } from "./place";

/** What a bundle holds, fixed at the heads of its drives' logs: the same plan always gives the same bytes. */
export interface BundlePlan {
  caseId: string;
  ref: string;
  workshop: string;
  /** when the latest of the started entries was written, RFC 3339 UTC */
  madeAt: string;
  drives: { number: number; id: string; head: { seq: number; hash: string } }[];
  workshopSeq: number;
  caseJson: string;
  images: BundleImage[];
  /** photos and documents, as they came */
  photos: BundleImage[];
  /** how many files of the case were erased before */
  erased: number;
  twoPersonRule: boolean;
  /** the key that signs the lists: the newest one that its workshop-keys.jsonl introduces */
  logKeyId: string;
  /** made when the bundle was started: over the last line of each drive's log in it */
  seal: BundleSeal;
  /** what the report's strips and verdicts show */
  drawing: ReportDrawing;
}

export interface BundleSeal {
  number: number;
  sha256: string;
  text: string;
  /** base64 */
  signature: string;
  /** PEM of the key that signed it */
  key: string;
  /** canonical JSON of the inclusion proof of each drive */
  proof: string;
}

/** Writes into each drive's log that a bundle leaves, and fixes what it holds while the logs are locked. */
export async function startBundle(actor: Actor, caseId: string): Promise<BundlePlan> {
  const found = await caseFor(actor, caseId);
  return inTransaction(async (tx) => {
    const drives = await Drive.findAll({ where: { caseId }, order: ["position"], transaction: tx });
    if (drives.length === 0) throw new AppError("rule-against", "This case has no drive yet, so there is nothing to pack. Record its drive first.");
    const heads = new Map<string, { seq: number; hash: string }>();
    let madeAt = "";
    const inOrder = drives.map((d) => d.id).sort();
    for (const id of inOrder) await lockChain(tx, id);
    for (const id of inOrder) {
      const before = await lockChain(tx, id);
      heads.set(id, await appendEntry(tx, id, actor, "bundle.started", { type: "bundle", id: caseId }, {
        caseRef: found.ref, head: { seq: before.seq, hash: before.hash.toString("hex") },
      }));
      const { at } = await lockChain(tx, id);
      if (at > madeAt) madeAt = at;
    }
    const { record, images, photos, erased, twoPersonRule } = await recordOfCase(tx, found, drives, heads);
    const workshop = env().workshop;
    const policy = await currentPolicy(tx);
    const seal = await sealOfBundle(tx, actor, drives.map((drive) => drive.id));
    const keys = await CustodyHead.findByPk(WORKSHOP_CHAIN, { transaction: tx });
    const caseJson = `${JSON.stringify({ format: "twinread-case/1", workshop, madeAt, policy, ...record }, null, 2)}\n`;
    return {
      caseId, ref: found.ref, workshop, madeAt, workshopSeq: keys?.seq ?? 0, images, photos, erased, seal, logKeyId: logKey().keyId, twoPersonRule: twoPersonRule && policy.twoPersonRule,
      drives: drives.map((drive, i) => ({ number: i + 1, id: drive.id, head: heads.get(drive.id)! })),
      caseJson, drawing: await drawingOf(tx, JSON.parse(caseJson) as ReportCase, policy),
    };
  }, { receipt: false });
}

async function sealOfBundle(tx: Transaction, actor: Actor, driveIds: string[]): Promise<BundleSeal> {
  const { seal, leaves } = await sealNow(tx, actor, "bundle");
  const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest();
  return {
    number: seal.number, sha256: seal.sha256, text: seal.text, signature: seal.signature, key: sealKey().publicKeyPem,
    proof: canonicalJson(sealProof(seal.number, leaves, driveIds, sha256)),
  };
}

/** After the last byte: which tag manifest left, and how far each log went with it. */
export async function completeBundle(actor: Actor, plan: BundlePlan, tagManifestSha256: string): Promise<void> {
  const drives = [...plan.drives].sort((a, b) => (a.id < b.id ? -1 : 1));
  await inTransaction(async (tx) => {
    for (const { id } of drives) await lockChain(tx, id);
    for (const { id, head } of drives) {
      await appendEntry(tx, id, actor, "bundle.completed", { type: "bundle", id: plan.caseId }, { caseRef: plan.ref, tagManifestSha256, upToSeq: head.seq });
    }
  }, { receipt: false });
}
