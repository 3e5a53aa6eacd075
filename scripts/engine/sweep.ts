import { createHash } from "node:crypto";
import { diagnosePair } from "@/lib/core/diagnose-pair";
import { judgeRead } from "@/lib/core/findings";
import { inspectWhole, nearlyEmpty, type ImageFacts } from "@/lib/core/inspect";
import { judgeSet, type SetRead } from "@/lib/core/judge-set";
import type { Finding } from "@/lib/core/words";
import { DEFAULT_POLICY } from "@/lib/core/words";
import { INJECTIONS } from "./inject";
import { randomOf } from "./random";
import type { RealImage } from "./real-images";

export interface Outcome {
  image: string;
  nearlyEmpty: boolean;
  injection: string;
  expected: string;
  code: string;
  /** the set with this read among two good ones, and where it shows by itself the set of it alone, is not ready */
  held: boolean;
  seed: number;
}

const digestOf = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest("hex");

function judged(bytes: Uint8Array, facts: ImageFacts, sizeBytes: number): Finding[] {
  return judgeRead({
    stage: "before", read: { sizeBytes: bytes.length, sha256: digestOf(bytes), fileName: "read.bin", modifiedAt: null },
    chip: { sizeBytes, sizeSource: "marking" }, facts, policy: DEFAULT_POLICY, earlier: [], elsewhere: [],
  });
}

/** Findings above note on an image that nothing was done to. */
export function falseAlarms(images: readonly RealImage[]): string[] {
  return images.flatMap(({ name, bytes }) => judged(bytes, inspectWhole(bytes), bytes.length)
    .filter((finding) => finding.severity !== "note").map((finding) => `${name}: ${finding.code}, ${finding.measured ?? ""}`));
}

function readOf(number: number, bytes: Uint8Array, findings: Finding[]): SetRead {
  return { number, seating: number < 3 ? 1 : 2, sha256: digestOf(bytes), sizeBytes: bytes.length, counted: true, findings };
}

/** Every kind of fault in every image, once for each seed. A fault that changes nothing there is left out. */
export function sweep(images: readonly RealImage[], seeds: readonly number[], onImage: (name: string) => void = () => undefined): Outcome[] {
  const outcomes: Outcome[] = [];
  for (const [index, { name, bytes: good }] of images.entries()) {
    onImage(name);
    const facts = inspectWhole(good);
    const findings = judged(good, facts, good.length);
    const chip = { sizeBytes: good.length, sizeSource: "marking" } as const;
    for (const seed of seeds) {
      for (const [kind, injection] of INJECTIONS.entries()) {
        const bad = injection.make(good, randomOf(seed * 100_003 + index * 101 + kind));
        if (!bad || digestOf(bad) === digestOf(good)) continue;
        const badFacts = inspectWhole(bad);
        const result = diagnosePair(good, bad, facts, badFacts, { nameA: "Read 1", nameB: "Read 3", sizeBytes: good.length });
        const badFindings = judged(bad, badFacts, good.length);
        const mixed = judgeSet([readOf(1, good, findings), readOf(2, good, findings), readOf(3, bad, badFindings)], new Map(), [{ a: 1, b: 3, result }], DEFAULT_POLICY, chip);
        const same = judgeSet([1, 2, 3].map((number) => readOf(number, bad, badFindings)), new Map(), [], DEFAULT_POLICY, chip);
        outcomes.push({
          image: name, nearlyEmpty: nearlyEmpty(facts), injection: injection.name, expected: injection.code, code: result.diagnosis.code,
          held: !mixed.ready && (!injection.alone || !same.ready), seed,
        });
      }
    }
  }
  return outcomes;
}

/** Share of right codes, 0 to 1. */
export function shareRight(outcomes: readonly Outcome[]): number {
  return outcomes.filter((one) => one.code === one.expected).length / outcomes.length;
}
