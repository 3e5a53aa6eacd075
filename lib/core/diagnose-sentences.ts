import type { Comparison } from "./compare";
import type { Cause, DiagnosisCode } from "./diagnose-cause";
import type { DiagnosisContext } from "./diagnosis";
import { countOf, sizeText } from "./quantity";
import { address, placeText } from "./strip";

/** After "looks like", for the sentence on a chip; null where there is no guess. */
export const LOOKS_LIKE: Partial<Record<DiagnosisCode, string>> = {
  blank: "no contact or no supply", "all-zero": "no supply or a line held low", constant: "a stuck line",
  "too-short": "a read that stopped early", padded: "padding", "extra-bytes": "a header or a larger chip set in the reader",
  "repeats-within": "a larger chip set in the reader", "address-line": "a stuck address line", "short-period": "an id instead of the content",
  "bit-slip": "a missed clock", "byte-slip": "a lost or repeated byte", "command-echo": "the command read back with the content",
  rotated: "a read that began at another address", "byte-swapped": "another byte order", "bit-reversed": "another bit order",
  inverted: "an inverting adapter", rearranged: "lines exchanged in the adapter", "lost-contact": "lost contact",
  "random-flips": "single bits that flip", "one-way-flips": "bits that flip one way", "foreign-blocks": "another part of the board talking on the line",
  "buffer-edge": "the reader's buffer edge", "edge-bytes": "a read that began too soon after power",
};

const CLEAN = "Clean the pins, re-seat the clip and read again.";

/** What to do next at the bench. */
const ADVICE: Partial<Record<DiagnosisCode, string>> = {
  equal: "A clip that sits wrong gives the same wrong image every time: a read from another seating says more.",
  "different-length": "Check the size set in the reader against the chip and read the whole chip again.",
  blank: "Check the supply and that the clip is on, then read again.",
  "all-zero": "Measure the supply at the chip, check ground, look for a short and read again.",
  constant: "Check the clip and the chip type set in the reader, then read again.",
  "too-short": "Read the whole chip again with its own size set.",
  padded: "Set the chip's own size in the reader and read again.",
  "extra-bytes": "Save the plain image without header or trailer, or set the chip's own size and read again.",
  "repeats-within": "Check marking and id, set the chip's own size and read again.",
  "address-line": "Clean the pins, check the address length set in the reader, lower the clock and read again.",
  "short-period": "Check the chip type, switch the supply off and on, wait and read again.",
  "bit-slip": "Lower the clock, shorten the leads, check the bus mode and read again.",
  "byte-slip": "Use another USB port or cable, smaller read blocks, tie hold and write-protect pins high and read again.",
  "command-echo": "The reader captures one phase too early: check its settings and read again.",
  rotated: "Start at address 0, check the address length set in the reader and read again.",
  "byte-swapped": "Check the organisation pin and the byte order set in the reader, choose one order and read again.",
  "bit-reversed": "Check the bit order set in the reader and read again.",
  inverted: "Take the inverting adapter out or set it right, then read again.",
  rearranged: "Check the adapter's wiring line by line and read again.",
  "lost-contact": CLEAN,
  "random-flips": "Lower the clock, shorten the leads, put 100 nF across the supply at the chip and read twice more.",
  "one-way-flips": "Check ground, contact and supply under load, lower the clock and read twice more. Lost charge in the chip looks the same.",
  "foreign-blocks": "Hold the controller in reset or read the chip out of circuit, then read again.",
  "buffer-edge": "Use another USB port, cable or driver, or smaller read blocks: it is the reader, not the chip. Read again.",
  "edge-bytes": "Wait 10 ms after power-up, check the chip select and read again.",
  unclassified: "Clean the pins, re-seat the clip, lower the clock and read again. The reads that agree show which one is off.",
};

interface Names {
  a: string;
  b: string;
  /** the faulty one first, where it is known */
  bad: string;
  good: string;
}

/** "Read 2 sits 1 bit earlier" */
function movedText(bits: number): string {
  const [n, way] = [Math.abs(bits), bits > 0 ? "earlier" : "later"];
  return n % 8 === 0 ? `${countOf(n / 8, "byte")} ${way}` : `${countOf(n, "bit")} ${way}`;
}

const VALUE = { blank: "FF", "all-zero": "00" } as const;

function lengthText(c: Comparison, { code, counts }: Cause, { a, b, bad, good }: Names): string {
  const sizes = `${a} has ${sizeText(c.sizeA)}, ${b} ${sizeText(c.sizeB)}`;
  switch (code) {
    case "too-short": return `${sizes}; ${bad} is the first part of ${good}: looks like a read that stopped early.`;
    case "padded": return `${sizes}; ${bad} is ${good} and one fill value behind it: looks like padding.`;
    case "repeats-within": return `${sizes}; ${bad} holds ${good} over and over: looks like a larger chip set in the reader.`;
    case "extra-bytes": return counts.offset === undefined
      ? `${sizes}; ${bad} goes on behind ${good}: looks like a trailer or a larger chip set in the reader.`
      : `${sizes}; ${bad} holds ${good} from ${address(counts.offset, Math.max(c.sizeA, c.sizeB))} on: looks like a header.`;
    default: {
      const common = c.differingBytes - Math.abs(c.sizeA - c.sizeB);
      return `${sizes}; what both hold is ${common === 0 ? "equal" : `different in ${countOf(common, "byte")}`}.`;
    }
  }
}

/** One plain sentence; what is a guess says "looks like". */
export function causeMessage(c: Comparison, cause: Cause, ctx: DiagnosisContext): string {
  const { code, counts, faulty } = cause;
  const { nameA: a, nameB: b } = ctx;
  const [bad, good] = faulty === "a" ? [a, b] : [b, a];
  const names = { a, b, bad, good };
  if (c.first === null || c.last === null) return `${a} and ${b} are equal in all ${countOf(c.sizeA, "byte")}.`;
  if (c.sizeA !== c.sizeB) return lengthText(c, cause, names);
  const where = `${countOf(c.differingBytes, "byte")}, ${placeText(c.first, c.last, ctx.sizeBytes)}`;
  const head = faulty ? `${bad} differs from ${good} in ${where}` : `${a} and ${b} differ in ${where}`;
  const guess = `looks like ${LOOKS_LIKE[code] ?? ""}`;
  switch (code) {
    case "blank": case "all-zero": {
      if (!faulty) return `${a} and ${b} each hold one value throughout, and not the same: ${guess}.`;
      return `${bad} is all ${VALUE[code]}, ${good} is not: ${guess}.`;
    }
    case "constant": return faulty ? `${bad} holds one value throughout, ${good} does not: ${guess}.` : `${a} and ${b} each hold one value throughout, and not the same: ${guess}.`;
    case "short-period": return `${bad} holds the same ${countOf(counts.bytes, "byte")} over and over, ${good} doesn't: ${guess}.`;
    case "address-line": return `${head}, and ${bad} repeats over address line ${counts.line}, which ${good} doesn't: ${guess}.`;
    case "bit-slip": case "byte-slip": {
      // from b's side: a positive shift lost bits
      const bits = faulty === "a" ? -counts.shiftBits : counts.shiftBits;
      return `Everything from ${address(c.first, ctx.sizeBytes)} on sits ${movedText(bits)} in ${bad} than in ${good}: ${guess}.`;
    }
    case "command-echo": return `${bad} begins with 4 bytes of the read command, then holds ${good}: ${guess}.`;
    case "rotated": return `${b} holds the bytes of ${a} from ${address(counts.bytes, ctx.sizeBytes)} on, then those before it: ${guess}.`;
    case "byte-swapped": return `${a} and ${b} hold the same bytes, exchanged within every ${counts.bits} bits: ${guess}.`;
    case "bit-reversed": return `Every byte of ${bad} has the bits of ${good} in reverse: ${guess}.`;
    case "inverted": return `Every bit of ${bad} is the opposite of ${good}'s: ${guess}.`;
    case "rearranged": return `${a} and ${b} hold the same bytes in another order: ${guess}.`;
    case "lost-contact": return faulty ? `${head}, and holds FF or 00 there: ${guess}.` : `${head}, where one holds FF and the other 00: ${guess}.`;
    case "random-flips": return `${head}, ${countOf(counts.singleBit, "of them by a single bit").replace("bits", "bit")}: ${guess}.`;
    case "one-way-flips": return `${head}; ${countOf(c.zeroToOne, "bit")} are 1 only in ${b}, ${countOf(c.oneToZero, "bit")} only in ${a}: ${guess}.`;
    case "foreign-blocks": return `${head}, in ${countOf(counts.segments, "stretch").replace("stretchs", "stretches")} of other data: ${guess}.`;
    case "buffer-edge": return `${head}, in ${countOf(counts.segments, "place")} that all begin at the edge of a block of 256 bytes: ${guess}.`;
    case "edge-bytes": return counts.atStart ? `${head}, only at the start: ${guess}.` : `${head}, only at the end: looks like a chip select that let go too soon.`;
    default: return counts.sparse
      ? `${head}; too little content to tell the cause.`
      : `${head}; the cause can't be told from the bytes.`;
  }
}

export function causeAdvice(code: DiagnosisCode): string {
  return ADVICE[code] ?? CLEAN;
}
