import { describe, expect, it } from "vitest";
import { diagnosePair } from "@/lib/core/diagnose-pair";
import { inspectWhole } from "@/lib/core/inspect";
import { groupsText, judgeSet, type SetPair, type SetRead } from "@/lib/core/judge-set";
import { DEFAULT_POLICY } from "@/lib/core/words";
import { fill, goldenImage, sha256Hex } from "./stream";

const good = goldenImage();
const chip = { sizeBytes: 8192, sizeSource: "marking" as const };
const burst = (at: number) => { const bytes = good.slice(); bytes.fill(0xff, at, at + 64); return bytes; };

/** Reads as bytes and seating, judged with every pair compared. */
function judge(taken: [Uint8Array, number][], policy = DEFAULT_POLICY) {
  const reads: SetRead[] = taken.map(([bytes, seating], i) => ({ number: i + 1, seating, sha256: sha256Hex(bytes), sizeBytes: bytes.length, counted: true }));
  const facts = new Map(taken.map(([bytes]) => [sha256Hex(bytes), inspectWhole(bytes)]));
  const pairs: SetPair[] = reads.flatMap((a, i) => reads.slice(i + 1).map((b) => ({
    a: a.number, b: b.number,
    result: diagnosePair(taken[a.number - 1][0], taken[b.number - 1][0], facts.get(a.sha256)!, facts.get(b.sha256)!, { nameA: `Read ${a.number}`, nameB: `Read ${b.number}`, sizeBytes: 8192 }),
  })));
  return judgeSet(reads, facts, pairs, policy, chip);
}

describe("a set of reads", () => {
  it("is ready when enough agree and nothing stands against it", () => {
    const verdict = judge([[good, 1], [good, 1], [good, 2]]);
    expect(verdict).toMatchObject({ ready: true, state: "ready", alone: [], common: [], findings: [] });
    expect(groupsText(verdict)).toBe("Reads 1, 2 and 3 agree.");
  });
  it("is not ready with too few reads or seatings", () => {
    expect(judge([[good, 1], [good, 2]])).toMatchObject({ ready: false, state: "needs-reads" });
    expect(judge([[good, 1], [good, 1], [good, 1]])).toMatchObject({ ready: false, state: "needs-reads" });
    expect(judge([])).toMatchObject({ ready: false, state: "unread" });
  });
  it("says who stands alone, what it looks like and what to do", () => {
    const verdict = judge([[good, 1], [good, 1], [burst(0x300), 2]]);
    expect(verdict).toMatchObject({ ready: false, state: "reads-disagree", alone: [3] });
    expect(verdict.sentence).toBe("Read 3 differs in 63 bytes, all in 0x0300–0x03FF: looks like lost contact. Re-seat the clip and read again.");
    expect(verdict.next).toBe("Clean the pins, re-seat the clip and read again.");
    expect(verdict.common).toEqual(["Read 3 is the only one from seating B."]);
    expect(groupsText(verdict)).toBe("Reads 1 and 2 agree and Read 3 stands alone.");
  });
  it("says what the disagreeing ones have in common", () => {
    const verdict = judge([[good, 1], [good, 1], [burst(0x300), 2], [burst(0x500), 2]]);
    expect(verdict.alone).toEqual([3, 4]);
    expect(verdict.common).toEqual(["Reads 3 and 4 are the only ones from seating B.", "Reads 3 and 4 all look like lost contact."]);
    expect(groupsText(verdict)).toBe("Reads 1 and 2 agree and Reads 3 and 4 stand each alone.");
    expect(judge([[good, 1], [good, 2], [burst(0x300), 2]]).common).toEqual([]);
  });
  it("still differs when all differ", () => {
    expect(judge([[good, 1], [burst(0x300), 1], [burst(0x500), 2]])).toMatchObject({ ready: false, state: "reads-disagree", alone: [1, 2, 3] });
  });
  it.each<[string, Uint8Array, string]>([
    ["a chip without contact", fill(8192, 0xff), "blank"],
    ["an address line that is stuck in every read", good.map((_, i) => good[i & ~0x100]), "address-line"],
    ["a repeated half", good.map((_, i) => good[i & 0xfff]), "repeats-within"],
    ["an id over and over", good.map((_, i) => [0x20, 0x40, 0x13][i % 3]), "short-period"],
    ["a read cut short", good.slice(0, 4096), "too-short"],
  ])("is held by %s although all agree", (_name, bytes, code) => {
    const verdict = judge([[bytes, 1], [bytes, 1], [bytes, 2]]);
    expect(verdict).toMatchObject({ ready: false, state: "held" });
    expect(verdict.findings.map(({ reads, finding }) => [reads, finding.code])).toContainEqual([[1, 2, 3], code]);
    expect(verdict.next).toBe(verdict.findings[0].finding.advice);
  });
  it("leaves reads that are set aside out", () => {
    const reads: SetRead[] = [good, good, good, burst(0)].map((bytes, i) => ({ number: i + 1, seating: i > 1 ? 2 : 1, sha256: sha256Hex(bytes), sizeBytes: 8192, counted: i < 3, findings: [] }));
    expect(judgeSet(reads, new Map(), [], DEFAULT_POLICY, chip).ready).toBe(true);
    expect(judgeSet(reads.map((one) => ({ ...one, counted: true })), new Map(), [], DEFAULT_POLICY, chip)).toMatchObject({ ready: false, alone: [4] });
  });
  it("takes the findings that are handed over", () => {
    const finding = { code: "other-drive" as const, severity: "blocks" as const, message: "Equals Read 1 of U7.", advice: "Check labels." };
    const reads: SetRead[] = [1, 2, 3].map((number) => ({ number, seating: number, sha256: "a", sizeBytes: 8192, counted: true, findings: [finding] }));
    expect(judgeSet(reads, new Map(), [], DEFAULT_POLICY, chip)).toMatchObject({ ready: false, state: "held", next: "Check labels." });
  });
});
