import { describe, expect, it } from "vitest";
import { bitRateText, candidateWords, columnsOf, compositeBehind, countsText, expectedText, madeOf, offersComposite, partText } from "@/components/composite/composite-words";
import { readTitle } from "@/lib/core/derived";
import type { ReadView, VotesView } from "@/lib/views";

const DERIVED: ReadView["derived"] = { method: "bit majority, n=3", voters: [3, 1, 2], excluded: [4], disputedBytes: 9, weak: 2, constructed: 0, limit: "" };
function read(number: number, sha: string, more: Partial<ReadView> = {}): ReadView {
  return {
    id: `r${number}`, chipId: "c", number, stage: "before", seating: 1, sizeBytes: 8192, crc32: "00000000", sha256: sha.repeat(64), counted: true, findings: [], format: "raw", fileName: "x.bin",
    reader: "R2", method: null, toolVersion: null, adapter: null, supplyMillivolts: null, clockKilohertz: null, controllerHeld: null, note: null, operator: { id: "u1", name: "Mira Hollis", role: "technician" },
    takenAt: null, modifiedAt: null, storedAt: "2026-03-12T09:00:00Z", transferId: null, setAside: null, source: null, derived: null, imageSound: true, ...more,
  };
}
const chip = (reads: ReadView[], boardRole: "original" | "donor" = "original") => ({ boardRole, sizeBytes: 8192, reads });

describe("a composite", () => {
  it("is offered where three reads are there and counted ones disagree, and nowhere else", () => {
    expect(offersComposite(chip([read(1, "a"), read(2, "b"), read(3, "c")]))).toBe(true);
    expect(offersComposite(chip([read(1, "a"), read(2, "b"), read(3, "c", { counted: false })]))).toBe(true);
    expect(offersComposite(chip([read(1, "a"), read(2, "b")]))).toBe(false);
    expect(offersComposite(chip([read(1, "a"), read(2, "a"), read(3, "a")]))).toBe(false);
    expect(offersComposite(chip([read(1, "a"), read(2, "b"), read(3, "c", { derived: DERIVED })]))).toBe(false);
    expect(offersComposite(chip([read(1, "a"), read(2, "b"), read(3, "c")], "donor"))).toBe(false);
  });

  it("never goes by the plain name of a read, and says what it is made of", () => {
    expect(readTitle(read(5, "a", { derived: DERIVED }))).toBe("Read 5, composite");
    expect(madeOf(DERIVED!)).toBe("Made of Reads 1, 2 and 3 by majority; Read 4 had no vote");
    expect(partText([read(1, "a"), read(5, "b", { derived: DERIVED })])).toBe("took Read 1 and made the composite Read 5");
  });

  it("stops being called one when a read holds the same image", () => {
    const made = read(5, "a", { derived: DERIVED });
    expect(compositeBehind([read(1, "b"), made], "a".repeat(64))).toBe(made);
    expect(compositeBehind([read(6, "a"), made], "a".repeat(64))).toBeNull();
    expect(compositeBehind([made], null)).toBeNull();
  });

  it("says before the vote which reads are odd, equal or set aside", () => {
    const reads = [read(1, "a"), read(2, "a", { sizeBytes: 4096, counted: false })];
    expect(candidateWords(reads[1], chip(reads))).toBe("seating A, R2, 4 KiB, not the chip’s 8 KiB, equals Read 1, set aside");
    const blank = read(3, "c", { findings: [{ code: "blank", severity: "blocks", message: "All FF.", advice: "Check pin 8." }] });
    expect(candidateWords(blank, chip([blank]))).toBe("seating A, R2, may not vote: it is blank");
  });
});

describe("the votes", () => {
  const sources: VotesView["sources"] = [{ number: 3, seating: 2, sha256: "" }, { number: 1, seating: 1, sha256: "" }];

  it("stand in the order of the reads, each with its own values", () => {
    expect(columnsOf({ sources })).toMatchObject([{ name: "Read 1", seating: "A", place: 1 }, { name: "Read 3", seating: "B", place: 0 }]);
  });

  it("are counted by how sure they are", () => {
    expect(countsText({ counts: { firm: 1037, weak: 3, constructed: 0, undecided: 0, disputed: 1040 } })).toBe("1,040 bytes disputed: 1,037 firm, 3 weak.");
  });

  it("give odds no more exact than they are", () => {
    expect([expectedText("0"), expectedText("4.188e-2"), expectedText("1.464e-4"), bitRateText("1.431e-4"), bitRateText("0")]).toEqual(["none", "0.0419", "fewer than 0.001", "1 bit in 6,990", "no bit"]);
  });
});
