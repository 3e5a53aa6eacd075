import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { compareImages } from "@/lib/core/compare";
import { diagnosePair } from "@/lib/core/diagnose-pair";
import { diagnoseReadBack, judgeRead } from "@/lib/core/findings";
import { inspectWhole } from "@/lib/core/inspect";
import { DEFAULT_POLICY, FINDING_CODES } from "@/lib/core/words";
import { sha256Hex } from "./stream";

/** Images with what real ones have: fill, repeats, text, noise; of any size from 1 byte on. */
const piece = fc.oneof(
  fc.uint8Array({ minLength: 1, maxLength: 200 }),
  fc.tuple(fc.constantFrom(0, 0xff, 0x55), fc.integer({ min: 1, max: 700 })).map(([value, n]) => new Uint8Array(n).fill(value)),
  fc.tuple(fc.uint8Array({ minLength: 1, maxLength: 70 }), fc.integer({ min: 1, max: 12 })).map(([unit, n]) => Uint8Array.from({ length: unit.length * n }, (_, i) => unit[i % unit.length])),
  fc.stringMatching(/^[ -~]{1,120}$/).map((text) => new TextEncoder().encode(text)),
);
const image = fc.array(piece, { minLength: 1, maxLength: 8 }).map((parts) => Uint8Array.from(parts.flatMap((part) => [...part])));
const magic = fc.constantFrom([0x50, 0x4b, 3, 4], [0x1f, 0x8b, 8, 0], [0x1f, 0x8b, 8, 31], [0x37, 0x7a, 0xbc, 0xaf, 0x27, 0x1c], [0x25, 0x50, 0x44, 0x46], [0x7f, 0x45, 0x4c, 0x46, 1, 1, 1], [58], [83, 49]);
const any = fc.oneof(image, fc.tuple(magic, image).map(([head, rest]) => Uint8Array.from([...head, ...rest])), fc.tuple(magic, fc.nat(40)).map(([head, n]) => Uint8Array.from([...head, ...new Uint8Array(n)])));
const edits = fc.array(fc.tuple(fc.nat(5000), fc.nat(255)), { maxLength: 30 });
const related = fc.tuple(any, edits, fc.nat(30), fc.integer({ min: -20, max: 20 })).map(([a, changes, turn, longer]) => {
  const turned = Uint8Array.from({ length: Math.max(1, a.length + longer) }, (_, i) => a[(i + turn) % a.length]);
  for (const [at, value] of changes) if (at < turned.length) turned[at] = value;
  return [a, turned] as const;
});
const pair = fc.oneof(related, fc.tuple(any, any));

describe("whatever comes in", () => {
  it("is judged, with findings in plain sentences", () => {
    fc.assert(fc.property(any, fc.integer({ min: 1, max: 4000 }), (bytes, sizeBytes) => {
      for (const stage of ["before", "donor", "after"] as const) {
        const found = judgeRead({
          stage, read: { sizeBytes: bytes.length, sha256: sha256Hex(bytes), fileName: "a", modifiedAt: null }, chip: { sizeBytes, sizeSource: "typed" },
          facts: inspectWhole(bytes), policy: DEFAULT_POLICY, earlier: [], elsewhere: [],
        });
        for (const one of found) {
          expect(FINDING_CODES).toContain(one.code);
          expect(one.message).toMatch(/^[A-Z0-9].*\.$/);
          expect(one.advice).toMatch(/\.$/);
          for (const range of one.ranges ?? []) expect(range.start >= 0 && range.length > 0).toBe(true);
        }
        expect(new Set(found.map((one) => one.code)).size).toBe(found.length);
      }
    }), { numRuns: 400 });
  });
  it("gets one diagnosis, the same from either side", () => {
    fc.assert(fc.property(pair, fc.integer({ min: 1, max: 4000 }), ([a, b], sizeBytes) => {
      const [factsA, factsB] = [inspectWhole(a), inspectWhole(b)];
      const ctx = { nameA: "Read 1", nameB: "Read 2", sizeBytes };
      const [there, back] = [diagnosePair(a, b, factsA, factsB, ctx), diagnosePair(b, a, factsB, factsA, ctx)];
      expect(back.diagnosis.code).toBe(there.diagnosis.code);
      expect(back.diagnosis.confidence).toBe(there.diagnosis.confidence);
      if (there.diagnosis.faulty) expect(back.diagnosis.faulty).toBe(there.diagnosis.faulty === "a" ? "b" : "a");
      expect(there.comparison).toEqual(compareImages(a, b));
      expect(there.diagnosis.code === "equal").toBe(there.comparison.equal);
      expect(there.diagnosis.message).toMatch(/^[A-Z].*\.$/);
      expect(there.diagnosis.message).not.toMatch(/undefined|NaN|null/);
      expect(Object.values(there.diagnosis.counts).every(Number.isInteger)).toBe(true);
    }), { numRuns: 1500 });
  });
  it("says of a read-back that is verified exactly when it is equal", () => {
    fc.assert(fc.property(pair, any, fc.boolean(), ([approved, readBack], old, known) => {
      const found = diagnoseReadBack(readBack, approved, known ? old : null);
      expect(found.code === "verified").toBe(compareImages(approved, readBack).equal);
      expect(found.message).toMatch(/^[A-Z0-9].*\.$/);
      expect(found.message).not.toMatch(/undefined|NaN|null/);
    }), { numRuns: 500 });
  });
});
