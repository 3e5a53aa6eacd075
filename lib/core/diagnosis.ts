import type { Comparison } from "./compare";
import { countOf, sizeText } from "./quantity";
import { placeText } from "./strip";

/** What a comparison looks like. `code`: equal, different-length, lost-contact or unclassified. */
export interface DiagnosisView {
  code: string;
  message: string;
  advice: string;
  confidence: "certain" | "likely" | "unsure";
}

export interface DiagnosisContext {
  nameA: string;
  nameB: string;
  /** the chip's size, for the width of addresses */
  sizeBytes: number;
}

/** Share of the differing bytes that must be FF or 00 in one read only. */
const FILL_SHARE = 0.8;
/** Fewer are no run (F16 speaks of 8 bytes and more). */
const LEAST_BYTES = 8;
/** Data against a fill differs in some 4 bits a byte; single flipped bits in an empty stretch in 1. */
const LEAST_BITS_A_BYTE = 2;

function lostContact(c: Comparison, { nameA, nameB }: DiagnosisContext): string | null {
  if (c.differingBytes < LEAST_BYTES || c.zeroToOne + c.oneToZero < LEAST_BITS_A_BYTE * c.differingBytes) return null;
  if (c.fillInA - c.fillInBoth >= FILL_SHARE * c.differingBytes) return nameA;
  if (c.fillInB - c.fillInBoth >= FILL_SHARE * c.differingBytes) return nameB;
  return null;
}

/** First guess at the cause from the counts of a comparison. A guess says "looks like". */
export function diagnose(c: Comparison, ctx: DiagnosisContext): DiagnosisView {
  const { nameA, nameB } = ctx;
  if (c.equal || c.first === null || c.last === null) {
    return {
      code: "equal", confidence: "certain",
      message: `${nameA} and ${nameB} are equal in all ${countOf(c.sizeA, "byte")}.`,
      advice: "A clip that sits wrong gives the same wrong image every time: a read from another seating says more.",
    };
  }
  if (c.sizeA !== c.sizeB) {
    const common = c.differingBytes - Math.abs(c.sizeA - c.sizeB);
    const start = common === 0 ? "equal" : `different in ${countOf(common, "byte")}`;
    return {
      code: "different-length", confidence: "certain",
      message: `${nameA} has ${sizeText(c.sizeA)}, ${nameB} ${sizeText(c.sizeB)}; what both hold is ${start}.`,
      advice: "Check the size set in the reader against the chip and read the whole chip again.",
    };
  }
  const where = `${countOf(c.differingBytes, "byte")}, ${placeText(c.first, c.last, ctx.sizeBytes)}`;
  const off = lostContact(c, ctx);
  if (off !== null) {
    return {
      code: "lost-contact", confidence: "likely",
      message: `${off} differs from ${off === nameA ? nameB : nameA} in ${where}, and holds FF or 00 there: looks like lost contact.`,
      advice: "Clean the pins, re-seat the clip and read again.",
    };
  }
  return {
    code: "unclassified", confidence: "unsure",
    message: `${nameA} and ${nameB} differ in ${where}; the cause can't be told from the bytes.`,
    advice: "Clean the pins, re-seat the clip, lower the clock and read again. The reads that agree show which one is off.",
  };
}
