import { createHash, createPublicKey } from "node:crypto";
import { describe } from "@/lib/core/custody-actions";
import type { Policy, Role } from "@/lib/core/words";
import { chipRecords } from "@/lib/queries/chip-records";
import { chipState } from "@/lib/queries/chip-state";
import { LISTED } from "@/lib/report/log-section";
import { makeReport } from "@/lib/report/make-report";
import type { ReportCase, ReportDrawing, ReportEntry } from "@/lib/report/report-facts";
import { allStacks, laneKey } from "@/lib/report/stacks";
import { Image, type Transaction } from "@/models";
import { keyIdOf, logKey } from "@/storage";
import { bodyLines } from "./bundle-log";
import type { BundlePlan } from "./bundle-plan";
import { comparisonOnRecord } from "./compare-images";
import { reducedOf } from "./photo-open";

/** What the report's pictures and verdicts show, while the drives' logs are locked. No image is opened. */
export async function drawingOf(tx: Transaction, record: ReportCase, policy: Policy): Promise<ReportDrawing> {
  const { records } = await chipRecords(record.drives.map((drive) => drive.id), tx);
  const states: ReportDrawing["states"] = {};
  for (const one of records) {
    const { label, sentence } = await chipState(one, policy, tx);
    states[one.chip.id] = { label, sentence };
  }
  const stacks = allStacks(record);
  const digests = [...new Set(stacks.flatMap((stack) => stack.rows.map((row) => row.sha256)))];
  const images = await Image.findAll({ attributes: ["sha256", "facts"], where: { sha256: digests.map((digest) => Buffer.from(digest, "hex")) }, transaction: tx });
  const lanes: ReportDrawing["lanes"] = {};
  for (const { rows } of stacks) {
    for (const [i, row] of rows.slice(1).entries()) {
      if (rows[i].sha256 === row.sha256 || lanes[laneKey(rows[i], row)]) continue;
      const known = await comparisonOnRecord(rows[i], row, tx) ?? await comparisonOnRecord(row, rows[i], tx);
      if (known) lanes[laneKey(rows[i], row)] = { differingBytes: known.differingBytes, cells: known.cells };
    }
  }
  return { states, strips: Object.fromEntries(images.map((image) => [image.sha256.toString("hex"), image.facts.cells])), lanes };
}

interface Body {
  at: string;
  actor: { name: string; role: Role | "system" };
  action: string;
  facts: Record<string, unknown>;
}

function entryOf(line: Buffer, seq: number): ReportEntry {
  const body = line.subarray(0, -1);
  const hash = createHash("sha256").update(body).digest("hex");
  try {
    const { at, actor, action, facts } = JSON.parse(body.toString("utf8")) as Body;
    return { seq, at, who: actor.name, role: actor.role, action, hash, facts: LISTED.includes(action) ? facts : null, ...describe(action, facts) };
  } catch {
    return { seq, at: "", who: "unknown", role: "system", action: "", hash, facts: null, kind: "differs", sentence: "This entry can’t be read: its body is damaged." };
  }
}

/** of the copies in the report, in pixels: they are printed about 55 mm wide */
const PICTURE_EDGE = 400;

const photosIn = (record: ReportCase) => [...(record.photos ?? []), ...record.drives.flatMap((drive) => drive.photos ?? [])].filter((photo) => photo.kind === "photo" && photo.file !== null);

/** data/report.pdf: the same plan gives the same bytes. */
export async function bundleReport(plan: BundlePlan): Promise<Buffer> {
  const logs: ReportEntry[][] = [];
  for (const { id, head } of plan.drives) {
    const entries: ReportEntry[] = [];
    for await (const line of bodyLines({ chain: id, upToSeq: head.seq })) entries.push(entryOf(line, entries.length + 1));
    logs.push(entries);
  }
  const record = JSON.parse(plan.caseJson) as ReportCase;
  const pictures = new Map<string, Buffer>();
  for (const { sha256, sizeBytes } of photosIn(record)) {
    const copy = await reducedOf(sha256, sizeBytes, PICTURE_EDGE).catch(() => null);
    if (copy) pictures.set(sha256, copy);
  }
  const { number, sha256, key } = plan.seal;
  return makeReport({
    record, logs, drawing: plan.drawing, logKey: logKey().keyId, seal: { number, sha256, keyFingerprint: keyIdOf(createPublicKey(key)) }, twoPersonRule: plan.twoPersonRule, pictures,
  });
}
