import { compareImages, type Comparison } from "./compare";
import { causeOf, type Cause, type DiagnosisCode, type JudgedImage, type Side } from "./diagnose-cause";
import { causeAdvice, causeMessage, LOOKS_LIKE } from "./diagnose-sentences";
import type { DiagnosisContext, DiagnosisView } from "./diagnosis";
import { inspectWhole, type ImageFacts } from "./inspect";

export { turnCause, type Cause, type DiagnosisCode } from "./diagnose-cause";

/** One primary cause with its counts. */
export interface Diagnosis extends DiagnosisView {
  code: DiagnosisCode;
  /** which read is off, where it can be told */
  faulty: Side | null;
  /** whole numbers; always differingBytes, zeroToOne and oneToZero, and what the code rests on */
  counts: Record<string, number>;
}

export interface PairDiagnosis {
  comparison: Comparison;
  diagnosis: Diagnosis;
}

/** Facts from a stream, or of an older engine, lack what the whole image shows: then it is looked at here. */
export function judgedImage(bytes: Uint8Array, facts: ImageFacts): JudgedImage {
  const full = facts.whole ? facts : inspectWhole(bytes);
  if (!full.whole) throw new TypeError("inspectWhole leaves nothing out");
  return { bytes, facts: full, whole: full.whole };
}

/**
 * The cause alone, without names: plain JSON that can be kept for a pair of digests. `chipBytes` only decides which of
 * two sizes is the wrong one.
 */
export function causeOfPair(a: Uint8Array, b: Uint8Array, factsA: ImageFacts, factsB: ImageFacts, chipBytes: number, comparison: Comparison): Cause {
  return causeOf(judgedImage(a, factsA), judgedImage(b, factsB), comparison.first, comparison.last, chipBytes);
}

/** A kept cause in words, with the names of this occasion. `comparison` and `cause` from the same side. */
export function sayCause(comparison: Comparison, cause: Cause, ctx: DiagnosisContext): Diagnosis {
  const { differingBytes, zeroToOne, oneToZero } = comparison;
  return {
    code: cause.code, confidence: cause.confidence, faulty: cause.faulty,
    message: causeMessage(comparison, cause, ctx), advice: causeAdvice(cause.code),
    counts: { differingBytes, zeroToOne, oneToZero, ...cause.counts },
  };
}

/**
 * Two reads compared byte by byte, and one primary cause of their difference: symmetric in its code. `comparison`
 * may be handed over where it is known already.
 */
export function diagnosePair(
  a: Uint8Array, b: Uint8Array, factsA: ImageFacts, factsB: ImageFacts, ctx: DiagnosisContext, comparison: Comparison = compareImages(a, b),
): PairDiagnosis {
  return { comparison, diagnosis: sayCause(comparison, causeOfPair(a, b, factsA, factsB, ctx.sizeBytes, comparison), ctx) };
}

/** After "looks like" in the sentence on a chip; null where a code is no guess. */
export function looksLikeText(code: string): string | null {
  return (LOOKS_LIKE as Record<string, string>)[code] ?? null;
}
