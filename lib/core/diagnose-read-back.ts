import { compareImages, type Comparison } from "./compare";
import { causeOf } from "./diagnose-cause";
import { judgedImage } from "./diagnose-pair";
import { causeAdvice, causeMessage } from "./diagnose-sentences";
import { inspectWhole, isUniform, type ImageFacts } from "./inspect";
import { countOf, sizeText } from "./quantity";
import { erasedSector, explainsAll, pageWrap, protectedPart } from "./read-back-writes";
import { placeText, rangeText } from "./strip";
import { FLIPS_SINGLE_BIT_SHARE, SECTOR_SIZES, WEAK_CELLS_MOST } from "./thresholds";
import type { FindingCode, Range } from "./words";

/** How a write went, as far as the bytes tell. */
export interface ReadBackDiagnosis {
  code: FindingCode;
  message: string;
  advice: string;
  measured: string;
  ranges?: Range[];
}

export interface ReadBackFacts {
  readBack?: ImageFacts;
  approved?: ImageFacts;
  comparison?: Comparison;
  /** in sentences: "Back 2" */
  name?: string;
}

const ONES = Uint8Array.from({ length: 256 }, (_, n) => n.toString(2).replaceAll("0", "").length);
const AGAIN = "Re-seat the clip and read back once more; if it differs again, write again.";

function singleBits(readBack: Uint8Array, approved: Uint8Array): number {
  let n = 0;
  for (let i = 0; i < readBack.length; i += 1) if (ONES[readBack[i] ^ approved[i]] === 1) n += 1;
  return n;
}

/** V1 to V4: the whole image at once. */
function wholeWrite(readBack: Uint8Array, approved: Uint8Array, old: Uint8Array | null, facts: ImageFacts): ReadBackDiagnosis | null {
  const size = readBack.length;
  if (old && old.length === size && explainsAll(readBack, old, () => -1)) {
    return {
      code: "write-refused", measured: "equal to the donor's saved content",
      message: "Equals what the donor held before the write: nothing was written.",
      advice: "Clear write protection (protect bits, write-protect pin), check that it is the right chip, then write again.",
    };
  }
  if (isUniform(facts) && facts.dominantByte === 0xff) {
    return { code: "erased-only", measured: `all ${countOf(size, "byte")} are FF`, message: "All FF: the chip was erased and then not written.", advice: "Write again, then read back." };
  }
  if (old && old.length === size && readBack.every((value, at) => value === (approved[at] & old[at]))) {
    return {
      code: "not-erased", measured: "every byte is approved AND old",
      message: "Equals approved AND old content: the chip was not erased.", advice: "Erase, check that it reads all FF, write, read back.",
    };
  }
  return null;
}

/** V5 V6, and what went wrong in a part of the chip. */
function partWrite(readBack: Uint8Array, approved: Uint8Array, old: Uint8Array | null, c: Comparison, first: number, last: number): ReadBackDiagnosis | null {
  const size = readBack.length;
  const pages = pageWrap(readBack, approved, old);
  if (pages) {
    return {
      code: "page-wrap", measured: `pages of ${pages.tool} written to pages of ${pages.chip}`,
      message: `Every ${pages.tool} bytes hold only the last ${pages.chip} of theirs: looks like a page size of ${pages.tool} set for a chip with ${pages.chip}.`,
      advice: "Set the right chip type or page size, then write again.",
    };
  }
  const where = `${countOf(c.differingBytes, "byte")}, ${placeText(first, last, size)}`;
  const kept = old ? protectedPart(readBack, approved, old) : null;
  if (kept) {
    return {
      code: "partly-protected", measured: `${sizeText(kept.length)} as before the write`, ranges: [kept],
      message: `${rangeText(kept.start, kept.length, size)} still holds what was there before, the rest is written: looks like block protection.`,
      advice: "Note the protect bits, clear them, then write again.",
    };
  }
  const sector = explainsAll(readBack, approved, () => 0xff) ? erasedSector(readBack, first, last) : null;
  if (sector) {
    const what = (SECTOR_SIZES as readonly number[]).includes(sector.length) ? "one sector" : "a row of sectors";
    return {
      code: "erased-only", measured: `${countOf(c.differingBytes, "byte")} are FF`, ranges: [sector],
      message: `${countOf(c.differingBytes, "byte")} ${c.differingBytes === 1 ? "is" : "are"} FF, all in ${rangeText(sector.start, sector.length, size)}: ${what} stayed erased.`,
      advice: "Write again, then read back.",
    };
  }
  // a handful of bytes fits several rules
  if (!old || c.differingBytes < 16) return null;
  if (explainsAll(readBack, approved, (at) => old[at])) {
    return {
      code: "partly-protected", measured: `${countOf(c.differingBytes, "byte")} as before the write`, ranges: c.ranges,
      message: `Still holds what was there before in ${where}: looks like a write that was refused in part.`,
      advice: "Note the protect bits, clear them, then write again.",
    };
  }
  if (explainsAll(readBack, approved, (at) => approved[at] & old[at])) {
    return {
      code: "not-erased", measured: `${countOf(c.differingBytes, "byte")} are approved AND old`, ranges: c.ranges,
      message: `Equals approved AND old content in ${where}: a part of the chip was not erased.`,
      advice: "Erase, check that it reads all FF, write, read back.",
    };
  }
  return null;
}

/**
 * V1 to V8: a read-back against the approved image, what the donor held before the write (null when that isn't known
 * or has another size) and the erased state. V9 needs other images: judgeReadBack. V7 gives the code of the fault.
 */
export function diagnoseReadBack(readBack: Uint8Array, approved: Uint8Array, old: Uint8Array | null, known: ReadBackFacts = {}): ReadBackDiagnosis {
  const c = known.comparison ?? compareImages(approved, readBack);
  const size = approved.length;
  if (c.first === null || c.last === null) {
    return {
      code: "verified", measured: "every byte equal", message: `Equals the approved image in all ${countOf(size, "byte")}.`,
      advice: "Read-backs from a second seating count more than another in the same one.",
    };
  }
  const before = old && old.length === size ? old : null;
  const facts = known.readBack ?? inspectWhole(readBack);
  const ctx = { nameA: "the approved image", nameB: known.name ?? "The read-back", sizeBytes: size };
  if (readBack.length !== size) {
    return {
      code: "differs", measured: countOf(readBack.length, "byte"),
      message: `Differs from the approved image: ${sizeText(readBack.length)} of ${sizeText(size)} read back.`, advice: "Set the chip's size in the reader and read back once more.",
    };
  }
  const write = wholeWrite(readBack, approved, before, facts) ?? partWrite(readBack, approved, before, c, c.first, c.last);
  if (write) return write;
  const where = `${countOf(c.differingBytes, "byte")}, ${placeText(c.first, c.last, size)}`;
  const single = singleBits(readBack, approved);
  if (c.differingBytes <= WEAK_CELLS_MOST && single >= FLIPS_SINGLE_BIT_SHARE * c.differingBytes) {
    return {
      code: "weak-cells", measured: `${countOf(single, "byte")} off by one bit`, ranges: c.ranges,
      message: `Differs from the approved image in ${where}, by single bits: looks like weak cells or a bad read.`,
      advice: "Read back again. If the same bits differ, the donor chip is bad: use another.",
    };
  }
  const cause = causeOf(judgedImage(approved, known.approved ?? inspectWhole(approved)), judgedImage(readBack, facts), c.first, c.last, size);
  if (cause.code === "unclassified" || cause.code === "equal" || cause.code === "different-length") {
    return { code: "differs", measured: countOf(c.differingBytes, "differing byte"), message: `Differs from the approved image in ${where}.`, advice: AGAIN };
  }
  const message = causeMessage(c, { ...cause, faulty: "b" }, ctx);
  return {
    code: cause.code, measured: countOf(c.differingBytes, "differing byte"),
    message: message[0].toUpperCase() + message.slice(1),
    advice: `${causeAdvice(cause.code)} If a second read-back is the same, it was written so: set the programmer right and write again.`,
  };
}
