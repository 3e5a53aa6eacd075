import { lengthCause } from "./diagnose-length";
import { isBitReversed, isInverted, rotationOf, sameHistogram, stuckLine, swappedWidth } from "./diagnose-order";
import { foreign, atOneEnd, lockedToEdges, lostContact, mostlySingleBits, oneWay, oneWayScore, segmentFactsOf } from "./diagnose-segments";
import { findShift, isCommandEcho, type Shift } from "./diagnose-shift";
import { isUniform, type ImageFacts, type WholeFacts } from "./inspect";
import { SHIFT_LEAST_WINDOWS } from "./thresholds";
import type { FindingCode } from "./words";

/** Codes of a diagnosis: the rows of the catalogue, and the three that are none. */
export type DiagnosisCode = FindingCode | "equal" | "different-length" | "unclassified";
export type Confidence = "certain" | "likely" | "unsure";
export type Side = "a" | "b";

/** One primary cause. `faulty`: which image it happened to, where that can be told. */
export interface Cause {
  code: DiagnosisCode;
  confidence: Confidence;
  faulty: Side | null;
  counts: Record<string, number>;
}

/** Facts of the whole image stand ready for both. */
export interface JudgedImage {
  bytes: Uint8Array;
  facts: ImageFacts;
  whole: WholeFacts;
}

const other = (side: Side): Side => (side === "a" ? "b" : "a");

function uniformCause(a: JudgedImage, b: JudgedImage): Cause | null {
  const [plainA, plainB] = [isUniform(a.facts), isUniform(b.facts)];
  if (!plainA && !plainB) return null;
  const codeOf = ({ facts }: JudgedImage): FindingCode => (facts.dominantByte === 0xff ? "blank" : facts.dominantByte === 0 ? "all-zero" : "constant");
  if (!(plainA && plainB)) return { code: codeOf(plainA ? a : b), confidence: "certain", faulty: plainA ? "a" : "b", counts: {} };
  const codes = [codeOf(a), codeOf(b)];
  const code = (["blank", "all-zero", "constant"] as const).find((one) => codes.includes(one)) ?? "constant";
  return { code, confidence: "certain", faulty: null, counts: {} };
}

/** The side whose text no longer reads; word scores must differ clearly. */
function lessText(a: number, b: number): Side | null {
  const clear = (more: number, less: number) => more >= 64 && more >= 5 * less;
  if (clear(a, b)) return "b";
  return clear(b, a) ? "a" : null;
}

/** F12 F13: the same bytes in another order. A rotation by a few bytes of fill is as well a lost byte. */
function orderCause(a: JudgedImage, b: JudgedImage, shift: () => Shift | null): Cause | null {
  const width = swappedWidth(a.bytes, b.bytes);
  if (width !== null) return { code: "byte-swapped", confidence: "certain", faulty: null, counts: { bits: width } };
  const rotated = rotationOf(a.bytes, b.bytes);
  if (rotated === null) return null;
  const size = a.bytes.length;
  const small = Math.min(rotated, size - rotated);
  const [wrapped, from] = rotated === small ? [a.bytes, 0] : [b.bytes, 0];
  const plain = small <= 16 && wrapped.subarray(from, from + small).every((value) => value === wrapped[from]);
  const slipped = plain ? shift() : null;
  return slipped ? slipCause(a, b, slipped) : { code: "rotated", confidence: "certain", faulty: null, counts: { bytes: rotated } };
}

/** F14 */
function changedCause(a: JudgedImage, b: JudgedImage): Cause | null {
  const faulty = lessText(a.whole.wordScores[0], b.whole.wordScores[0]);
  if (isInverted(a.bytes, b.bytes)) {
    // an erased chip is FF: the read full of 00 is the inverted one
    const byFill = a.facts.ffCount > 2 * b.facts.ffCount + 16 ? "b" : b.facts.ffCount > 2 * a.facts.ffCount + 16 ? "a" : null;
    return { code: "inverted", confidence: "certain", faulty: faulty ?? byFill, counts: {} };
  }
  return isBitReversed(a.bytes, b.bytes) ? { code: "bit-reversed", confidence: "certain", faulty, counts: {} } : null;
}

/** F06: the content repeats over an address line in exactly one of the two. */
function aliasCause(a: JudgedImage, b: JudgedImage): Cause | null {
  // an image that repeats does so over every line from its period's on
  const exact = ({ whole: { repeats } }: JudgedImage) => repeats.lines.filter((one) => one.matches === one.informative);
  const covers = ({ whole: { repeats } }: JudgedImage, line: number) => repeats.lines.some((one) => one.line === line && one.matches === one.informative)
    || (repeats.period !== null && repeats.period.bytes <= 2 ** line) || repeats.short !== null;
  const [onlyA, onlyB] = [exact(a).filter(({ line }) => !covers(b, line)), exact(b).filter(({ line }) => !covers(a, line))];
  if ((onlyA.length === 0) === (onlyB.length === 0)) return null;
  const side: Side = onlyA.length > 0 ? "a" : "b";
  const [good, bad] = side === "a" ? [b, a] : [a, b];
  const found = (side === "a" ? onlyA : onlyB).map((one) => ({ ...one, stuck: stuckLine(good.bytes, bad.bytes, one.line) }));
  const shown = found.find((one) => one.stuck !== null) ?? found[0];
  return { code: "address-line", confidence: shown.stuck ? "certain" : "likely", faulty: side, counts: { line: shown.line, informative: shown.informative } };
}

/** F20: one read holds an id over and over, the other content. */
function shortCause(a: JudgedImage, b: JudgedImage): Cause | null {
  const [shortA, shortB] = [a.whole.repeats.short, b.whole.repeats.short];
  if ((shortA === null) === (shortB === null)) return null;
  return { code: "short-period", confidence: "likely", faulty: shortA ? "a" : "b", counts: { bytes: (shortA ?? shortB)?.bytes ?? 0 } };
}

/** F10 F11. Text in the read that slipped reads again when the bits are moved back. */
function slipCause(a: JudgedImage, b: JudgedImage, shift: Shift): Cause {
  const moved = ((shift.bits % 8) + 8) % 8;
  const faulty = moved === 0 ? null : lessText(b.whole.wordScores[(8 - moved) % 8], a.whole.wordScores[moved]);
  return {
    code: moved === 0 ? "byte-slip" : "bit-slip",
    confidence: shift.matched * 2 >= shift.windows ? "likely" : "unsure",
    faulty, counts: { shiftBits: shift.bits, windows: shift.windows, matched: shift.matched },
  };
}

/** F16 to F19, F22, F23, from the stretches that differ. */
function segmentCause(a: JudgedImage, b: JudgedImage, first: number, last: number, windows: number): Cause {
  const size = a.bytes.length;
  const f = segmentFactsOf(a.bytes, b.bytes, first, last);
  const counts = { segments: f.segments, singleBit: f.singleBit };
  const end = atOneEnd(f, size);
  if (end) return { code: "edge-bytes", confidence: "likely", faulty: null, counts: { ...counts, atStart: end === "first" ? 1 : 0 } };
  if (lockedToEdges(f)) return { code: "buffer-edge", confidence: "likely", faulty: null, counts };
  const contact = lostContact(f);
  if (contact) {
    return { code: "lost-contact", confidence: contact === "either" ? "unsure" : "likely", faulty: contact === "either" ? null : contact, counts };
  }
  if (mostlySingleBits(f)) {
    const score = oneWayScore(f, a.whole.oneBits, b.whole.oneBits, size);
    if (oneWay(score)) return { code: "one-way-flips", confidence: "likely", faulty: null, counts };
    return { code: "random-flips", confidence: f.differing >= 4 ? "likely" : "unsure", faulty: null, counts };
  }
  if (foreign(f)) return { code: "foreign-blocks", confidence: "likely", faulty: null, counts: { ...counts, foreignBytes: f.foreignBytes } };
  return { code: "unclassified", confidence: "unsure", faulty: null, counts: windows < SHIFT_LEAST_WINDOWS ? { ...counts, sparse: 1 } : counts };
}

function ordered(a: JudgedImage, b: JudgedImage, first: number, last: number): Cause {
  const plain = uniformCause(a, b);
  if (plain) return plain;
  let found: ReturnType<typeof findShift> | null = null;
  const shifted = () => (found ??= findShift(a.bytes, b.bytes, first));
  const same = sameHistogram(a.bytes, b.bytes);
  const known = (same ? orderCause(a, b, () => shifted().shift) : null) ?? changedCause(a, b) ?? shortCause(a, b) ?? aliasCause(a, b);
  if (known) return known;
  for (const side of ["a", "b"] as const) {
    const [bad, good] = side === "a" ? [a, b] : [b, a];
    if (isCommandEcho(good.bytes, bad.bytes)) return { code: "command-echo", confidence: "certain", faulty: side, counts: { shiftBits: side === "a" ? 32 : -32 } };
  }
  const { shift, windows } = shifted();
  if (shift) return slipCause(a, b, shift);
  if (same) return { code: "rearranged", confidence: "likely", faulty: null, counts: {} };
  return segmentCause(a, b, first, last, windows);
}

/** The same cause, seen from the other image. `sizeBytes`: of both, where they have one size. */
export function turnCause(cause: Cause, sizeBytes: number): Cause {
  const counts = { ...cause.counts };
  if ("shiftBits" in counts) counts.shiftBits = -counts.shiftBits;
  if (cause.code === "rotated") counts.bytes = sizeBytes - counts.bytes;
  return { ...cause, counts, faulty: cause.faulty && other(cause.faulty) };
}

/**
 * One primary cause for two images, in the catalogue's order: length, identical, uniform, same bytes in another
 * order, inverted or reversed, address line, shift, stretches. `first` and `last`: differing addresses, null when
 * equal. The code is the same whichever image comes first: they are looked at in an order of their own.
 */
export function causeOf(a: JudgedImage, b: JudgedImage, first: number | null, last: number | null, chipBytes: number): Cause {
  if (first === null || last === null) return { code: "equal", confidence: "certain", faulty: null, counts: {} };
  if (a.bytes.length !== b.bytes.length) return lengthCause(a.bytes, b.bytes, [a.facts, b.facts], chipBytes);
  if (a.bytes[first] <= b.bytes[first]) return ordered(a, b, first, last);
  return turnCause(ordered(b, a, first, last), a.bytes.length);
}
