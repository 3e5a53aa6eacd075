import { compareIfStored } from "@/lib/commands/compare-images";
import { placeOfChip } from "@/lib/commands/place";
import { allow, notFound } from "@/lib/commands/refuse";
import { requireSoundImage } from "@/lib/commands/report-image";
import { sayCause } from "@/lib/core/diagnose-pair";
import { type Actor, readName, type Stage } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { ComparisonView, ReadView, StripStackView } from "@/lib/views";
import { Image, Read } from "@/models";
import { imageWindow } from "@/storage";
import { stripImage } from "./chip-summary";
import { people } from "./people";
import { readView } from "./read-view";
import { stripStack } from "./strips";

interface Asked {
  reads: [number, number];
  stage: Stage;
}

async function twoReads(actor: Actor, chipId: string, { reads, stage }: Asked): Promise<{ rows: [Read, Read]; sizeBytes: number }> {
  allow(actor, "case.read");
  const { chip } = await placeOfChip(chipId);
  const rows = await Promise.all(reads.map((number) => Read.findOne({ where: { chipId, stage, number } })));
  const missing = rows.findIndex((r) => r === null);
  if (missing >= 0) throw new AppError("not-found", `${chip.designator} has no ${readName(stage, reads[missing])}. Choose from the chip's reads.`);
  return { rows: rows as [Read, Read], sizeBytes: chip.sizeBytes };
}

async function compared(rows: [Read, Read], sizeBytes: number): Promise<ComparisonView> {
  const [a, b] = rows.map((r) => ({ sha256: r.sha256.toString("hex"), sizeBytes: r.sizeBytes }));
  for (const image of [a, b]) {
    const row = await Image.findByPk(Buffer.from(image.sha256, "hex"));
    if (row?.state !== "sound") await requireSoundImage(image.sha256, image.sizeBytes, "comparison");
  }
  const c = await compareIfStored(a, b, undefined, sizeBytes);
  if (!c) {
    for (const image of [a, b]) await requireSoundImage(image.sha256, image.sizeBytes, "comparison");
    throw new AppError("unavailable", "The stored images could not be read just now. Try again in a moment.", { retryAfterSeconds: 2 });
  }
  const [nameA, nameB] = rows.map((r) => readName(r.stage, r.number));
  return {
    equal: c.equal, differingBytes: c.differingBytes, differingBits: { zeroToOne: c.zeroToOne, oneToZero: c.oneToZero }, ranges: c.ranges,
    ...(c.truncated ? { truncated: true as const } : {}), diagnosis: sayCause(c, c.cause, { nameA, nameB, sizeBytes }),
  };
}

export async function comparison(actor: Actor, chipId: string, asked: Asked): Promise<ComparisonView> {
  const { rows, sizeBytes } = await twoReads(actor, chipId, asked);
  return compared(rows, sizeBytes);
}

/** For the compare page: the comparison with both reads and their strips. */
export async function comparisonView(actor: Actor, chipId: string, asked: Asked): Promise<ComparisonView & { readA: ReadView; readB: ReadView; stack: StripStackView }> {
  const { rows, sizeBytes } = await twoReads(actor, chipId, asked);
  return comparisonOf(rows, sizeBytes);
}

/** Two reads, of one chip or of an original and what was written from it. The caller has asked whether the actor may. */
export async function comparisonOf(rows: [Read, Read], sizeBytes: number): Promise<ComparisonView & { readA: ReadView; readB: ReadView; stack: StripStackView }> {
  const who = await people();
  const result = await compared(rows, sizeBytes);
  return { ...result, readA: readView(rows[0], who), readB: readView(rows[1], who), stack: await stripStack(rows.map(stripImage), sizeBytes) };
}

/** A window of a read's bytes, for looking at; not a hand-out. */
export async function readBytes(actor: Actor, readId: string, { offset, length }: { offset: number; length: number }): Promise<Buffer> {
  allow(actor, "read.bytes");
  const read = await Read.findByPk(readId);
  if (!read) throw notFound("read");
  if (offset >= read.sizeBytes) throw new AppError("does-not-fit", `This image ends at byte ${read.sizeBytes.toLocaleString("en")}. Choose an offset before that.`);
  const image = await Image.findByPk(read.sha256);
  if (image?.state !== "sound") throw new AppError("rule-against", "The stored image no longer matches its digest, so its bytes aren't shown. Tell the lead.");
  try {
    return await imageWindow(read.sha256.toString("hex"), offset, Math.min(length, read.sizeBytes - offset));
  } catch (error) {
    // gone since its row was written: found out, written down and refused
    await requireSoundImage(read.sha256.toString("hex"), read.sizeBytes, "a look at its bytes");
    throw error;
  }
}
