import { compareImages, createComparison, type Comparison } from "@/lib/core/compare";
import { diagnosePair, type Diagnosis } from "@/lib/core/diagnose-pair";
import { judgeRead } from "@/lib/core/findings";
import { inspectWhole, type ImageFacts } from "@/lib/core/inspect";
import { judgeSet } from "@/lib/core/judge-set";
import { countOf } from "@/lib/core/quantity";
import { DEFAULT_POLICY, readName, type Finding, type Policy } from "@/lib/core/words";
import { gunzips } from "@/lib/engine/gunzips";
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

/** Seatings, drives and other cases are unknown here, so nothing is asked of them: only what the files show is judged. */
const HERE: Policy = { ...DEFAULT_POLICY, reads: 1, seatings: 0 };

/** `size`: the chip's, or null where it isn't known: then each image is taken to be whole. */
export async function judgeReads(loaded: readonly LoadedRead[], size: number | null): Promise<JudgedRead[]> {
  // once for each content
  const known = new Map<string, ImageFacts>();
  for (const { sha256, bytes } of loaded) if (!known.has(sha256)) known.set(sha256, inspectWhole(bytes, await gunzips(bytes)));
  return loaded.map((read, i) => {
    const [sizeBytes, facts] = [read.bytes.length, known.get(read.sha256)!];
    const findings = judgeRead({
      stage: "before", read: { ...read, sizeBytes }, chip: { sizeBytes: size ?? sizeBytes, sizeSource: "typed" }, facts, policy: HERE, elsewhere: [],
      earlier: loaded.slice(0, i).map((one, k) => ({ ...one, number: k + 1, stage: "before" as const, counted: true })),
    });
    return { ...read, number: i + 1, facts, findings };
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

export function verdictOf(reads: readonly JudgedRead[], pairs: readonly JudgedPair[], size: number | null): Verdict {
  const facts = new Map(reads.map((read) => [read.sha256, read.facts]));
  const set = judgeSet(
    reads.map((read) => ({ ...read, sizeBytes: read.bytes.length, seating: 1, counted: true })), facts,
    pairs.map(({ reads: [a, b], ...result }) => ({ a, b, result })), HERE,
    { sizeBytes: size ?? Math.max(...reads.map((read) => read.bytes.length)), sizeSource: "typed" },
  );
  if (!set.ready) return { ready: false, sentence: [set.sentence, ...set.common].join(" ") };
  if (reads.length === 1) return { ready: true, sentence: "Nothing stands against this one read, and one read can't be compared. Read the chip again, in another seating too." };
  const more = reads.length < DEFAULT_POLICY.reads ? ` Take ${countOf(DEFAULT_POLICY.reads - reads.length, "more read")}.` : "";
  return {
    ready: true,
    sentence: `${reads.length} of ${reads.length} reads are equal and nothing stands against them.${more} A clip that sits wrong gives the same wrong image every time: let the reads come from two seatings.`,
  };
}
