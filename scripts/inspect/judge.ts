import { agreement, deriveReadingState, oddOneOut, openFindings, type StateRead, type WorstDifference } from "@/lib/core/chip-state";
import { compareImages, createComparison, type Comparison } from "@/lib/core/compare";
import { diagnosePair, looksLikeText, type Diagnosis } from "@/lib/core/diagnose-pair";
import { judgeRead } from "@/lib/core/findings";
import { inspectWhole, type ImageFacts } from "@/lib/core/inspect";
import { countOf } from "@/lib/core/quantity";
import { DEFAULT_POLICY, readName, type Finding, type Policy } from "@/lib/core/words";
import type { LoadedRead } from "./load";

export interface JudgedRead extends LoadedRead {
  number: number;
  facts: ImageFacts;
  findings: Finding[];
}

export interface JudgedPair {
  reads: [number, number];
  comparison: Comparison;
  diagnosis: Diagnosis;
}

export interface Verdict {
  /** all equal, and no finding of severity blocks or reason: ends with 0 */
  ready: boolean;
  sentence: string;
}

/** Seatings, drives and other cases are unknown here: only what the files themselves show is judged. */
const HERE: Policy = { ...DEFAULT_POLICY, reads: 1, seatings: 1 };

function once<T>(make: (read: LoadedRead) => T): (read: LoadedRead) => T {
  const made = new Map<string, T>();
  return (read) => {
    const known = made.get(read.sha256) ?? make(read);
    made.set(read.sha256, known);
    return known;
  };
}

/** `size`: the chip's, or null where it isn't known: then each image is taken to be whole. */
export function judgeReads(loaded: readonly LoadedRead[], size: number | null): JudgedRead[] {
  const factsOf = once((read) => inspectWhole(read.bytes));
  return loaded.map((read, i) => {
    const sizeBytes = read.bytes.length;
    const chip = { sizeBytes: size ?? sizeBytes, sizeSource: "typed" as const };
    const rest = read.bytes.subarray(chip.sizeBytes);
    const findings = judgeRead({
      stage: "before", read: { ...read, sizeBytes }, chip, facts: factsOf(read), policy: HERE, elsewhere: [],
      earlier: loaded.slice(0, i).map((one, k) => ({ ...one, number: k + 1, stage: "before" as const, counted: true })),
      ...(rest.length > 0 ? { tail: { uniform: rest.every((byte) => byte === rest[0]) } } : {}),
    });
    return { ...read, number: i + 1, facts: factsOf(read), findings };
  });
}

function compared(a: JudgedRead, b: JudgedRead): Comparison {
  // equal digests: nothing to look for
  return a.sha256 === b.sha256 ? createComparison(a.bytes.length, b.bytes.length).finish() : compareImages(a.bytes, b.bytes);
}

/** Every pair, each two contents compared once. */
export function comparePairs(reads: readonly JudgedRead[], size: number | null): JudgedPair[] {
  const done = new Map<string, Comparison>();
  return reads.flatMap((a, i) => reads.slice(i + 1).map((b): JudgedPair => {
    const key = `${a.sha256} ${b.sha256}`;
    const comparison = done.get(key) ?? compared(a, b);
    done.set(key, comparison);
    const names = { nameA: readName("before", a.number), nameB: readName("before", b.number), sizeBytes: size ?? Math.max(a.bytes.length, b.bytes.length) };
    return { reads: [a.number, b.number], ...diagnosePair(a.bytes, b.bytes, a.facts, b.facts, names, comparison) };
  }));
}

/** The pair that a sentence on disagreeing reads speaks of: the odd one against the first of the largest group. */
function worstOf(states: StateRead[], pairs: readonly JudgedPair[]): WorstDifference | null {
  const odd = oddOneOut(states);
  const other = agreement(states).groups[0].reads[0];
  const pair = pairs.find((one) => odd !== null && one.reads.includes(odd) && one.reads.includes(other)) ?? pairs.find((one) => !one.comparison.equal);
  if (!pair || pair.comparison.first === null || pair.comparison.last === null) return null;
  const oddRead = odd !== null && pair.reads.includes(odd) ? odd : pair.reads[1];
  const { differingBytes, first, last } = pair.comparison;
  const otherRead = pair.reads[0] === oddRead ? pair.reads[1] : pair.reads[0];
  return { oddRead, otherRead, differingBytes, first, last, looksLike: looksLikeText(pair.diagnosis.code) };
}

export function verdictOf(reads: readonly JudgedRead[], pairs: readonly JudgedPair[], size: number | null): Verdict {
  const states = reads.map((read): StateRead => ({
    id: String(read.number), number: read.number, stage: "before", seating: read.number, sha256: read.sha256, sizeBytes: read.bytes.length,
    counted: true, findings: read.findings, operatorId: "",
  }));
  const equal = agreement(states).groups.length === 1;
  const against = openFindings({ policy: HERE, reads: states }).length > 0;
  if (!equal || against) {
    const sizeBytes = size ?? Math.max(...reads.map((read) => read.bytes.length));
    return { ready: false, sentence: deriveReadingState({ policy: HERE, sizeBytes, reads: states, worst: equal ? null : worstOf(states, pairs) }).sentence };
  }
  if (reads.length === 1) return { ready: true, sentence: "Nothing stands against this one read, and one read can't be compared. Read the chip again, in another seating too." };
  const more = reads.length < DEFAULT_POLICY.reads ? ` Take ${countOf(DEFAULT_POLICY.reads - reads.length, "more read")}.` : "";
  return {
    ready: true,
    sentence: `${reads.length} of ${reads.length} reads are equal and nothing stands against them.${more} A clip that sits wrong gives the same wrong image every time: let the reads come from two seatings.`,
  };
}
