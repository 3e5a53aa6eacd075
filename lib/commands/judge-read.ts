import { Op } from "sequelize";
import { sizeContradiction } from "@/lib/core/chip-id";
import { derivedFacts } from "@/lib/core/derived";
import { ENGINE_VERSION } from "@/lib/core/engine-version";
import type { JudgeInput } from "@/lib/core/findings";
import { judgeRead } from "@/lib/core/findings";
import { type ImageFacts, nearlyBlank } from "@/lib/core/inspect";
import type { ChipOfImage } from "@/lib/core/single-findings";
import { countOf } from "@/lib/core/quantity";
import { placeText } from "@/lib/core/strip";
import { type Finding, readName, SYSTEM } from "@/lib/core/words";
import { currentPolicy } from "@/lib/queries/policy";
import { type Chip, Image, inTransaction, Read, type Transaction, Transfer } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { compareIfStored } from "./compare-images";
import { inspectImage } from "./inspect-image";
import { judgeReadBackOf } from "./judge-read-back";
import { familyOf } from "./judge-read-family";
import { type ChipPlace, driveLetter, placeOfChip } from "./place";

/** The findings of one read, from its image and from what else is on record at this moment. */
export async function findingsOf(tx: Transaction, place: ChipPlace, read: Read): Promise<Finding[]> {
  const facts = await factsOf(tx, read);
  if (read.stage === "after") return judgeReadBackOf(tx, place, read, facts);
  const siblings = await Read.findAll({ where: { chipId: place.chip.id, stage: read.stage, number: { [Op.lt]: read.number } }, order: ["number"], transaction: tx });
  const derived = derivedFacts(read);
  const own = derived ? derived.findings : [];
  return [...own, ...judgeRead({
    stage: read.stage,
    read: { sizeBytes: read.sizeBytes, sha256: read.sha256.toString("hex"), fileName: read.fileName, modifiedAt: read.modifiedAt?.toISOString() ?? null },
    chip: chipOfImage(place.chip),
    facts, policy: await currentPolicy(tx),
    earlier: siblings.map((r) => ({
      number: r.number, stage: r.stage, sha256: r.sha256.toString("hex"), fileName: r.fileName, modifiedAt: r.modifiedAt?.toISOString() ?? null, counted: r.counted,
    })),
    // every workshop holds many blank images: they say nothing about where they come from, so nothing is looked up
    elsewhere: nearlyBlank(facts) ? [] : await elsewhere(tx, place, read),
    family: await familyOf(tx, place, read, facts),
  })];
}

function chipOfImage(chip: Chip): ChipOfImage {
  const { sizeBytes, sizeSource } = chip;
  const [idBytes, sfdpBytes] = [chip.idBytes ?? null, chip.sfdp ?? null];
  return { sizeBytes, sizeSource, idBytes, sfdpBytes, contradiction: sizeContradiction({ sizeBytes, sizeSource }, idBytes, sfdpBytes)?.message ?? null };
}

/** The image's facts by the present engine; those of an older one are worked out again and kept. */
async function factsOf(tx: Transaction, read: Read): Promise<ImageFacts> {
  const image = (await Image.findByPk(read.sha256, { transaction: tx }))!;
  if (image.engineVersion === ENGINE_VERSION) return image.facts;
  const facts = await inspectImage(read.sha256.toString("hex"), tx);
  await image.update({ facts, engineVersion: ENGINE_VERSION }, { transaction: tx });
  return facts;
}

/** Counted reads of other chips that hold these very bytes; the read-backs of this chip's own transfers, to whatever donor, are left out. */
async function elsewhere(tx: Transaction, place: ChipPlace, read: Read): Promise<JudgeInput["elsewhere"]> {
  if (read.stage !== "before") return [];
  const same = await Read.findAll({ where: { sha256: read.sha256, counted: true, chipId: { [Op.ne]: place.chip.id } }, order: ["storedAt"], transaction: tx });
  const own = new Set((await Transfer.findAll({ attributes: ["id"], where: { chipId: place.chip.id }, transaction: tx })).map((t) => t.id));
  const places = new Map<string, ChipPlace>();
  for (const id of new Set(same.map((other) => other.chipId))) places.set(id, await placeOfChip(id, tx));
  const found: JudgeInput["elsewhere"] = [];
  for (const other of same) {
    if (other.transferId && own.has(other.transferId)) continue;
    const there = places.get(other.chipId)!;
    const relation = other.stage === "donor" ? "donor-content" : there.drive.id === place.drive.id ? "other-chip" : "other-drive";
    found.push({
      relation, readName: readName(other.stage, other.number), designator: there.chip.designator,
      caseRef: there.case.id === place.case.id ? `Drive ${driveLetter(there.drive)}` : there.case.ref,
      sameSerial: place.drive.serial !== null && place.drive.serial === there.drive.serial,
    });
  }
  return found;
}

/** Writes the findings to the read and, when they are new or changed, an entry "read judged" by Twinread. */
export async function judge(tx: Transaction, place: ChipPlace, read: Read, fresh = false): Promise<Finding[]> {
  const findings = await findingsOf(tx, place, read);
  const text = JSON.stringify(findings);
  if (!fresh && text === read.findings && read.engineVersion === ENGINE_VERSION) return findings;
  await read.update({ findings: text, engineVersion: ENGINE_VERSION }, { transaction: tx });
  const others = await Read.findAll({ where: { chipId: place.chip.id, stage: read.stage, counted: true, id: { [Op.ne]: read.id }, transferId: read.transferId ?? null }, order: ["number"], transaction: tx });
  const equal = others.filter((r) => r.sha256.equals(read.sha256));
  await appendEntry(tx, place.drive.id, SYSTEM, "read.judged", { type: "read", id: read.id }, {
    read: { id: read.id, stage: read.stage, number: read.number }, chip: { id: place.chip.id, designator: place.chip.designator },
    sha256: read.sha256.toString("hex"), engineVersion: ENGINE_VERSION,
    findings: findings.map(({ code, severity, message, measured, threshold }) => ({ code, severity, message, measured, threshold })),
    equalTo: equal.map((r) => readName(r.stage, r.number)),
    differsFrom: await differences(tx, place, read, others.filter((r) => !equal.includes(r))),
  });
  return findings;
}

/** "Read 1 in 214 bytes, all in 0x1F000–0x1FFFF": the first read of each image that differs. */
async function differences(tx: Transaction, place: ChipPlace, read: Read, others: Read[]): Promise<string[]> {
  const distinct = others.filter((r, i) => others.findIndex((o) => o.sha256.equals(r.sha256)) === i);
  const ref = (r: Read) => ({ sha256: r.sha256.toString("hex"), sizeBytes: r.sizeBytes });
  return Promise.all(distinct.map(async (other) => {
    const name = readName(other.stage, other.number);
    const c = await compareIfStored(ref(other), ref(read), tx);
    return !c || c.first === null || c.last === null ? name : `${name} in ${countOf(c.differingBytes, "byte")}, ${placeText(c.first, c.last, place.chip.sizeBytes)}`;
  }));
}

/** Judges every read of a chip afresh, after a corrected size, a changed pair or the like. */
export async function judgeChip(tx: Transaction, place: ChipPlace): Promise<void> {
  for (const read of await Read.findAll({ where: { chipId: place.chip.id }, order: ["stage", "number"], transaction: tx })) await judge(tx, place, read);
}

/**
 * The other side of a cross check: when an image turns up on one chip, or is set aside there, the `before` reads of
 * other chips that hold the same bytes are judged again, each chain in a transaction of its own.
 */
export async function judgeSameImages(sha256: Buffer, exceptChipId: string): Promise<void> {
  const image = await Image.findByPk(sha256);
  if (!image || nearlyBlank(image.facts)) return;
  const same = await Read.findAll({ where: { sha256, stage: "before", chipId: { [Op.ne]: exceptChipId } } });
  for (const { id, chipId } of same) {
    const { drive } = await placeOfChip(chipId);
    await inTransaction(async (tx) => {
      await lockChain(tx, drive.id);
      await judge(tx, await placeOfChip(chipId, tx), (await Read.findByPk(id, { transaction: tx }))!);
    });
  }
}

