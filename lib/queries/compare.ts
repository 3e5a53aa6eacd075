import { compareIfStored, type Compared } from "@/lib/commands/compare-images";
import { chipFor } from "@/lib/commands/place";
import { allow } from "@/lib/commands/refuse";
import { requireSoundImage } from "@/lib/commands/report-image";
import { safeName } from "@/lib/core/bundle-layout";
import { loneImage, type Third, threeWay, type ThreeWay, threeWayText } from "@/lib/core/compare-three";
import { looksLikeText, sayCause } from "@/lib/core/diagnose-pair";
import { causeAdvice } from "@/lib/core/diagnose-sentences";
import { address } from "@/lib/core/strip";
import { type Actor, type Range, readName, type Stage } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { ComparedReads, ComparisonView } from "@/lib/views";
import { type Chip, Image, Read } from "@/models";
import { stateNow } from "@/storage";
import { type CsvColumn, csvHeader, csvLines } from "./csv";
import { stripImage } from "./chip-summary";
import { people } from "./people";
import { readView } from "./read-view";
import { seenBy } from "./seen-by";
import { stripStack } from "./strips";

interface Asked {
  reads: readonly number[];
  stage: Stage;
}

async function rowsOf(actor: Actor, chipId: string, { reads, stage }: Asked): Promise<{ rows: Read[]; chip: Chip }> {
  allow(actor, "case.read");
  const { chip } = await chipFor(actor, chipId);
  const rows = await Promise.all(reads.map((number) => Read.findOne({ where: { chipId, stage, number } })));
  const missing = rows.findIndex((r) => r === null);
  if (missing >= 0) throw new AppError("not-found", `${chip.designator} has no ${readName(stage, reads[missing])}. Choose from the chip's reads.`);
  return { rows: rows as Read[], chip };
}

const refOf = (row: Read) => ({ sha256: row.sha256.toString("hex"), sizeBytes: row.sizeBytes });
const nameOf = (row: Read) => readName(row.stage, row.number);

async function pairOf(rows: readonly [Read, Read], sizeBytes: number): Promise<Compared> {
  const [a, b] = rows.map(refOf);
  for (const image of [a, b]) {
    const row = await Image.findByPk(Buffer.from(image.sha256, "hex"));
    if (row?.state !== "sound" || (await stateNow(image.sha256, image.sizeBytes)) !== "sound") await requireSoundImage(image.sha256, image.sizeBytes, "comparison");
  }
  const c = await compareIfStored(a, b, undefined, sizeBytes);
  if (c) return c;
  for (const image of [a, b]) await requireSoundImage(image.sha256, image.sizeBytes, "comparison");
  throw new AppError("unavailable", "The stored images could not be read just now. Try again in a moment.", { retryAfterSeconds: 2 });
}

async function compared(rows: readonly [Read, Read], sizeBytes: number): Promise<ComparisonView> {
  const c = await pairOf(rows, sizeBytes);
  return {
    equal: c.equal, differingBytes: c.differingBytes, differingBits: { zeroToOne: c.zeroToOne, oneToZero: c.oneToZero }, ranges: c.ranges,
    ...(c.truncated ? { truncated: true as const } : {}), diagnosis: sayCause(c, c.cause, { nameA: nameOf(rows[0]), nameB: nameOf(rows[1]), sizeBytes }),
  };
}

export async function comparison(actor: Actor, chipId: string, asked: Asked): Promise<ComparisonView> {
  const { rows: [a, b], chip } = await rowsOf(actor, chipId, asked);
  return compared([a, b], chip.sizeBytes);
}

/** For the compare page: two or three reads with what they differ in and their strips. */
export async function comparedReads(actor: Actor, chipId: string, asked: Asked): Promise<ComparedReads> {
  const { rows, chip } = await rowsOf(actor, chipId, asked);
  const [a, b, c] = rows;
  return seenBy(actor, c ? await threeOf([a, b, c], chip.sizeBytes) : await comparisonOf([a, b], chip.sizeBytes));
}

/** Two reads, of one chip or of an original and what was written from it. The caller has asked whether the actor may. */
export async function comparisonOf(rows: [Read, Read], sizeBytes: number): Promise<ComparedReads> {
  const who = await people();
  return { ...await compared(rows, sizeBytes), reads: rows.map((row) => readView(row, who)), stack: await stripStack(rows.map(stripImage), sizeBytes) };
}

async function threeWayOf([a, b, c]: readonly [Read, Read, Read], sizeBytes: number): Promise<{ pairs: [Compared, Compared, Compared]; three: ThreeWay }> {
  const pairs: [Compared, Compared, Compared] = [await pairOf([a, b], sizeBytes), await pairOf([a, c], sizeBytes), await pairOf([b, c], sizeBytes)];
  return { pairs, three: threeWay(...pairs) };
}

async function threeOf(rows: [Read, Read, Read], sizeBytes: number): Promise<ComparedReads> {
  const who = await people();
  const { pairs, three } = await threeWayOf(rows, sizeBytes);
  const names = rows.map(nameOf) as [string, string, string];
  const lone = loneImage(three);
  // beside the two that agree the one that stands alone shows its cause; where no such two are, the first pair's is a start
  const { cause } = pairs[lone === 2 ? 1 : 0].equal ? pairs[2] : pairs[lone === 2 ? 1 : 0];
  const guess = lone === null ? null : looksLikeText(cause.code);
  return {
    equal: three.ranges.length === 0, differingBytes: three.differingBytes, differingBits: null, ranges: three.ranges, ...(three.truncated ? { truncated: true as const } : {}),
    diagnosis: { code: cause.code, confidence: cause.confidence, message: `${threeWayText(three, names, sizeBytes)}${guess ? ` It looks like ${guess}.` : ""}`, advice: causeAdvice(cause.code) },
    reads: rows.map((row) => readView(row, who)), stack: await stripStack(rows.map(stripImage), sizeBytes),
  };
}

/** The ranges of two or three reads as CSV (RFC 4180), with what stands alone in each. No byte of an image is in it. */
export async function differencesCsv(actor: Actor, chipId: string, asked: Asked): Promise<{ text: string; fileName: string }> {
  const { rows, chip } = await rowsOf(actor, chipId, asked);
  const [a, b, c] = rows;
  const three = c ? (await threeWayOf([a, b, c], chip.sizeBytes)).three : null;
  const found: { parts: readonly (Range & { alone?: Third | null })[]; truncated: boolean } = three ?? await pairOf([a, b], chip.sizeBytes).then(({ ranges, truncated }) => ({ parts: ranges, truncated }));
  const columns: CsvColumn<(typeof found.parts)[number]>[] = [
    { header: "First address", cell: ({ start }) => address(start, chip.sizeBytes) },
    { header: "Last address", cell: ({ start, length }) => address(start + length - 1, chip.sizeBytes) },
    { header: "Bytes", cell: ({ length }) => length },
    ...(three ? [{ header: "Stands alone", cell: ({ alone }: { alone?: Third | null }) => (alone === null || alone === undefined ? "no two agree" : nameOf(rows[alone])) }] : []),
  ];
  const text = csvHeader(columns) + csvLines(columns, found.parts);
  const numbers = rows.map((r) => r.number).join("-");
  return { text, fileName: `${safeName(chip.designator)}-${asked.stage}-${numbers}-${found.truncated ? "first-differences" : "differences"}.csv` };
}
