import { randomUUID } from "node:crypto";
import { Readable } from "node:stream";
import { causeText, readsThatAreOff, voteExclusion } from "@/lib/core/composite-rules";
import type { DerivedFacts } from "@/lib/core/derived";
import { crc32Hex } from "@/lib/core/digest";
import { ENGINE_VERSION } from "@/lib/core/engine-version";
import { type Actor, type Finding, readName, SYSTEM } from "@/lib/core/words";
import { engine } from "@/lib/engine/pool";
import { AppError } from "@/lib/errors";
import { people } from "@/lib/queries/people";
import { readView } from "@/lib/queries/read-view";
import type { CompositeInput } from "@/lib/schemas/read";
import type { ReadView } from "@/lib/views";
import { inTransaction, Read, type Transaction } from "@/models";
import { type Arrived, pathOfImage, receive } from "@/storage";
import { appendEntry, lockChain } from "./append-entry";
import { comparisonOnRecord } from "./compare-images";
import { inspectImage, recordImage } from "./inspect-image";
import { judge } from "./judge-read";
import { keepImage } from "./keep-image";
import { chipFor, type ChipPlace, placeOfChip } from "./place";
import { allow } from "./refuse";
import { requireSoundImage } from "./report-image";
import { revokeStanding } from "./revoke-approval";

/** All sources are in memory at once while they are voted on. Bytes. */
const MOST_BYTES = 1024 * 1024 * 1024;

interface Made {
  image: Arrived;
  report: Arrived;
  derived: DerivedFacts;
}

/**
 * A lead makes a composite of reads by bitwise majority (trade rules in lib/core/composite-rules.ts). It becomes a
 * derived read that stands for its voters; the voters are set aside, since they all differ from it or may.
 */
export async function makeComposite(actor: Actor, chipId: string, input: CompositeInput): Promise<ReadView> {
  allow(actor, "composite.make");
  const place = await chipFor(actor, chipId);
  if (place.board.role !== "original") throw new AppError("does-not-fit", "A composite is made of reads of the original's chip. Open that one.");
  const rows = await Read.findAll({ where: { chipId, stage: "before", number: input.reads }, order: ["number"] });
  const missing = input.reads.find((number) => !rows.some((r) => r.number === number));
  if (missing !== undefined) throw new AppError("does-not-fit", `There is no Read ${missing} of ${place.chip.designator}. Choose from its reads.`);
  const nested = rows.find((r) => r.derived);
  if (nested) throw new AppError("does-not-fit", `Read ${nested.number} is a composite itself. Choose reads that came from the chip.`);
  if (rows.reduce((sum, r) => sum + r.sizeBytes, 0) > MOST_BYTES) throw new AppError("does-not-fit", "These reads are more than 1 GiB together. Choose fewer.");
  for (const row of rows) await requireSoundImage(row.sha256.toString("hex"), row.sizeBytes, "composite");
  const made = await vote(rows);
  return inTransaction(async (tx) => {
    await lockChain(tx, place.drive.id);
    const now = await placeOfChip(chipId, tx);
    for (const arrived of [made.report, made.image]) await recordImage(tx, arrived, await inspectImage(arrived.sha256, tx));
    const row = await store(tx, actor, now, made, input.reason);
    await setVotersAside(tx, actor, now, row, made.derived);
    await judge(tx, now, row, true);
    await revokeStanding(tx, SYSTEM, chipId, "differing-read", `A composite was made as ${readName("before", row.number)}.`);
    return readView((await Read.findByPk(row.id, { transaction: tx }))!, await people(tx));
  });
}

/** What the comparisons on record say of each two of them; images of one size only, another size is a finding of its own. */
async function causes(rows: Read[]): Promise<{ a: number; b: number; code: string }[]> {
  const found: { a: number; b: number; code: string }[] = [];
  for (const [i, a] of rows.entries()) {
    for (const b of rows.slice(i + 1)) {
      if (a.sizeBytes !== b.sizeBytes || a.sha256.equals(b.sha256)) continue;
      const ref = (row: Read) => ({ sha256: row.sha256.toString("hex"), sizeBytes: row.sizeBytes });
      const comparison = await comparisonOnRecord(ref(a), ref(b));
      if (comparison) found.push({ a: a.number, b: b.number, code: comparison.cause.code });
    }
  }
  return found;
}

async function vote(rows: Read[]): Promise<Made> {
  const off = readsThatAreOff(rows.map((row) => row.number), await causes(rows));
  const result = await engine("vote", {
    sources: rows.map((row) => ({
      file: pathOfImage(row.sha256.toString("hex")), sha256: row.sha256.toString("hex"), seating: row.seating, number: row.number,
      excluded: voteExclusion(JSON.parse(row.findings) as Finding[], off.get(row.number)),
    })),
  });
  if ("refused" in result) throw new AppError("rule-against", result.refused);
  const image = await receive(Readable.from([Buffer.from(result.bytes)]));
  const report = await receive(Readable.from([Buffer.from(result.report, "utf8")]));
  for (const arrived of [image, report]) await keepImage(arrived, "composite");
  return { image, report, derived: { ...result.derived, reportSha256: report.sha256 } };
}

async function store(tx: Transaction, actor: Actor, { chip, drive }: ChipPlace, { image, derived }: Made, reason: string): Promise<Read> {
  const number = ((await Read.max<number, Read>("number", { where: { chipId: chip.id, stage: "before" }, transaction: tx })) ?? 0) + 1;
  const row = await Read.create({
    id: randomUUID(), chipId: chip.id, stage: "before", number, seating: derived.voters[0].seating, transferId: null, reader: "Twinread, by majority", note: reason, format: "raw",
    fileName: `composite-${number}.bin`, storedAt: new Date(), operatorId: actor.id, sha256: Buffer.from(image.sha256, "hex"), sizeBytes: image.sizeBytes,
    crc32: image.crc32, findings: "[]", engineVersion: ENGINE_VERSION, derived: JSON.stringify(derived),
  }, { transaction: tx });
  await appendEntry(tx, drive.id, actor, "composite.made", { type: "read", id: row.id }, {
    read: { id: row.id, stage: "before", number }, chip: { id: chip.id, designator: chip.designator }, sha256: image.sha256, sizeBytes: image.sizeBytes,
    crc32: crc32Hex(image.crc32), method: derived.method, version: derived.version, reportSha256: derived.reportSha256, reason,
    voters: [...derived.voters].sort((a, b) => a.number - b.number).map((v) => ({ name: readName("before", v.number), seating: v.seating, sha256: v.sha256 })),
    excluded: derived.excluded.map((e) => ({ name: readName("before", e.number), cause: e.cause })),
    disputedBytes: derived.disputedBytes, weak: derived.counts.weak, constructed: derived.counts.constructed,
  });
  return row;
}

async function setVotersAside(tx: Transaction, actor: Actor, { chip, drive }: ChipPlace, composite: Read, derived: DerivedFacts): Promise<void> {
  const name = readName("before", composite.number);
  const cause = new Map(derived.excluded.map((e) => [e.number, e.cause]));
  const voters = await Read.findAll({ where: { chipId: chip.id, stage: "before", counted: true, number: [...derived.voters, ...derived.excluded].map((v) => v.number) }, order: ["number"], transaction: tx });
  for (const read of voters) {
    const left = cause.get(read.number);
    const reason = left ? `Left out of the composite ${name}: ${causeText(left)}.` : `Voted into the composite ${name}.`;
    await read.update({ counted: false, setAsideReason: reason, setAsideBy: actor.id, setAsideAt: new Date() }, { transaction: tx });
    await appendEntry(tx, drive.id, actor, "read.set-aside", { type: "read", id: read.id }, {
      read: { id: read.id, stage: read.stage, number: read.number }, chip: { id: chip.id, designator: chip.designator }, sha256: read.sha256.toString("hex"), reason,
    });
  }
}
