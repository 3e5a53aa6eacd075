import { describe, expect, it } from "vitest";
import { compositeReport, COMPOSITE_LIMIT, makeComposite, type CompositeSource } from "@/lib/core/composite";
import { compositeFindings } from "@/lib/core/composite-findings";
import { CompositeRefusal, readsThatAreOff, voteExclusion } from "@/lib/core/composite-rules";
import { fill, sha256Hex, stream } from "./stream";

const GOOD = stream("bench-seed-1", 4096);

/** The good image with some bytes changed. */
function read(changes: Record<number, number>, seating: number, over: Partial<CompositeSource> = {}): CompositeSource {
  const bytes = GOOD.slice();
  for (const [at, value] of Object.entries(changes)) bytes[Number(at)] = value;
  return { bytes, sha256: sha256Hex(bytes), seating, ...over };
}
const flip = (at: number, bit: number) => ({ [at]: GOOD[at] ^ (1 << bit) });

const noisy = () => [read(flip(10, 0), 1), read(flip(20, 3), 1), read({ ...flip(30, 7), ...flip(31, 1) }, 2), read(flip(10, 0), 2, { excluded: "it is shifted by bits (bit-slip)" })];

function permutations<T>(items: T[]): T[][] {
  return items.length < 2 ? [items] : items.flatMap((item, i) => permutations([...items.slice(0, i), ...items.slice(i + 1)]).map((rest) => [item, ...rest]));
}
function refusalOf(sources: CompositeSource[]): string {
  try {
    makeComposite(sources);
  } catch (error) {
    expect(error).toBeInstanceOf(CompositeRefusal);
    expect((error as CompositeRefusal).message).toMatch(/[^!]\.$/);
    return (error as CompositeRefusal).code;
  }
  return "made";
}

describe("a composite", () => {
  it("restores the image, and says what each byte rests on", () => {
    const made = makeComposite(noisy());
    expect(made.bytes).toEqual(GOOD);
    expect(made).toMatchObject({ method: "bit majority, n=3", version: 1, sizeBytes: 4096, disputedBytes: 4, seatings: 2, equalSources: 0, minorityVotes: 4, limit: COMPOSITE_LIMIT });
    expect(made.disputed.map((one) => [one.at, one.chosen, one.support, one.standing])).toEqual([10, 20, 30, 31].map((at) => [at, GOOD[at], 2, "weak"]));
    expect(made.excluded).toEqual([{ sha256: noisy()[3].sha256, seating: 2, number: null, cause: "it is shifted by bits (bit-slip)" }]);
    // 4 lost votes of 3 × 32768 bits; at that rate N·(3p²−2p³)
    expect(made.odds.bitErrorRate).toBe("4.069e-5");
    expect(made.odds.expectedWrongBits).toBe("1.628e-4");
    expect(made.odds.expectedWrongBitsByMargin).toBe("1.628e-4");
    expect(made.odds.leastSureByte).toBe("0.999959310");
  });
  it("is the same, report and all, whatever the order of the sources", () => {
    const reports = permutations(noisy()).map((sources) => {
      const made = makeComposite(sources);
      return compositeReport(made, sha256Hex(made.bytes));
    });
    expect(reports).toHaveLength(24);
    expect(new Set(reports).size).toBe(1);
    // pinned: whoever changes the report raises COMPOSITE_VERSION
    expect(sha256Hex(reports[0])).toBe("cb93001c3cdfff07c9df3cd7d416067c3ac7fa3a1e3881ffc12669cad612e1e8");
    expect(JSON.parse(reports[0])).toMatchObject({ derived: true, method: "bit majority, n=3", sha256: sha256Hex(GOOD), counts: { disputed: 4, weak: 4 } });
  });
  it("is the same where one image was read in two seatings", () => {
    const [a, b, c] = noisy();
    const reports = permutations([a, { ...a, seating: 2 }, { ...a, seating: 3, excluded: "x" }, b, c, read(flip(50, 4), 1)]).map((sources) => compositeReport(makeComposite(sources), "x"));
    expect(new Set(reports).size).toBe(1);
  });
  it("changes its report when a source, a seating or a cause changes", () => {
    const text = (sources: CompositeSource[]) => compositeReport(makeComposite(sources), "x");
    const base = text(noisy());
    const [a, b, c, d] = noisy();
    expect(text([a, b, { ...c, seating: 3 }, d])).not.toBe(base);
    expect(text([a, b, c, { ...d, excluded: "another cause" }])).not.toBe(base);
    expect(text([a, b, c])).not.toBe(base);
    expect(text([a, b, read(flip(40, 2), 2), d])).not.toBe(base);
  });
  it("does not touch what it was given", () => {
    const sources = noisy();
    const before = sources.map((one) => sha256Hex(one.bytes));
    makeComposite(sources);
    expect(sources.map((one) => sha256Hex(one.bytes))).toEqual(before);
  });
});

describe("refuses", () => {
  const [a, b, c, excluded] = noisy();
  it.each<[string, CompositeSource[]]>([
    ["too-few", []], ["too-few", [a, b]], ["too-few", [a, b, excluded]],
    ["one-seating", [a, b, { ...c, seating: 1 }]],
    ["different-size", [a, b, { ...c, bytes: c.bytes.slice(0, 4095) }]],
    ["different-size", [a, b, c].map((one) => ({ ...one, bytes: new Uint8Array(0) }))],
    ["families", [a, { ...a, seating: 2 }, b, { ...b, seating: 2 }]],
    ["families", [a, a, b, { ...b, seating: 2 }, c]],
    ["agreeing-reads", [a, { ...a, seating: 2 }, { ...a, seating: 3 }, b]],
    ["ties", [read(flip(10, 0), 1), read(flip(10, 0), 1, { sha256: "0".repeat(64) }), read({}, 2), read(flip(20, 1), 2)]],
  ])("%s", (code, sources) => expect(refusalOf(sources)).toBe(code));
  it("more than one byte in a hundred, and not one fewer", () => {
    const many = (n: number) => [read(Object.assign({}, ...Array.from({ length: n }, (_, i) => flip(8 * i, 1))), 1), read({}, 1), read(flip(0, 2), 2)];
    expect(refusalOf(many(41))).toBe("too-many-disputed");
    expect(refusalOf(many(40))).toBe("made");
    const short = many(40).map((one) => ({ ...one, bytes: one.bytes.slice(0, 4000) }));
    expect(refusalOf(short)).toBe("made");
    expect(refusalOf(short.map((one) => ({ ...one, bytes: one.bytes.slice(0, 3999) })))).toBe("too-many-disputed");
  });
  it("as many votes for as against at one bit of thousands", () => {
    expect(refusalOf([read(flip(7, 7), 1), read({}, 1), read(flip(9, 0), 2), read({ ...flip(7, 7), ...flip(9, 0) }, 2)])).toBe("ties");
  });
  it("by one sentence that names who may not vote, and why", () => {
    const numbered = [a, b, excluded].map((one, i) => ({ ...one, number: i + 1 }));
    expect(() => makeComposite(numbered)).toThrow("Read 3 may not vote because it is shifted by bits, so only 2 reads are left of the 3 that a composite needs: take more reads.");
    const blank = { ...c, number: 4, excluded: "it is blank (blank)" };
    expect(() => makeComposite([...numbered.slice(1), blank])).toThrow("Read 3 may not vote because it is shifted by bits, and Read 4 because it is blank, so only 1 read is left of the 3 that a composite needs: take more reads.");
    expect(() => makeComposite([a, b, { ...c, seating: 1 }, blank])).toThrow(/^All reads that may vote come from one seating, .* Read 4 may not vote because it is blank\.$/);
    expect(() => makeComposite([a, b])).toThrow("A composite needs 3 reads that may vote; there are 2. Take more reads.");
  });
  it("by naming the reads of other lengths and those that are equal", () => {
    const of = (number: number, one: CompositeSource): CompositeSource => ({ ...one, number });
    expect(() => makeComposite([of(1, a), of(2, b), of(3, { ...c, bytes: c.bytes.slice(0, 4000) })])).toThrow("different lengths in bytes: Read 3 has 4,000 and Reads 1 and 2 have 4,096.");
    expect(() => makeComposite([of(1, a), of(2, a), of(3, b), of(4, { ...b, seating: 2 })])).toThrow(/^Reads [13] and [24] are equal and Reads [13] and [24] are equal: /);
    expect(() => makeComposite([of(1, a), of(2, { ...a, seating: 2 }), of(5, { ...a, seating: 3 }), of(6, b)])).toThrow(/^Reads 1, 2 and 5 are equal, and equal reads beat a vote\./);
  });
});

describe("reads that are off as a whole", () => {
  const pair = (a: number, b: number, code: string) => ({ a, b, code });
  it("are those that most others differ from in the same place-by-place fault", () => {
    const off = readsThatAreOff([1, 2, 3], [pair(1, 2, "random-flips"), pair(1, 3, "byte-slip"), pair(2, 3, "byte-slip")]);
    expect([...off]).toEqual([[3, ["byte-slip", "byte-slip"]]]);
    expect(voteExclusion([], off.get(3))).toBe("it is shifted by bytes (byte-slip)");
  });
  it("are nobody where as many are off as are not, or where all faults are local", () => {
    expect(readsThatAreOff([1, 2], [pair(1, 2, "inverted")]).size).toBe(0);
    expect(readsThatAreOff([1, 2, 3, 4], [pair(1, 3, "rotated"), pair(1, 4, "rotated"), pair(2, 3, "rotated"), pair(2, 4, "rotated")]).size).toBe(0);
    expect(readsThatAreOff([1, 2, 3], [pair(1, 2, "lost-contact"), pair(1, 3, "random-flips"), pair(2, 3, "unclassified")]).size).toBe(0);
  });
});

it("lets two equal reads among others vote, and says that the vote gives their image", () => {
  expect(makeComposite([read({}, 1), read({}, 2), read(flip(3, 3), 2)]).equalSources).toBe(2);
});

describe("who may vote", () => {
  it("is nobody with a fault that moves or replaces the whole image", () => {
    const blocks = (code: string) => [{ code, severity: "blocks" as const }];
    for (const code of ["blank", "all-zero", "constant", "repeats-within", "address-line", "short-period", "too-short", "padded", "extra-bytes", "text-file", "container-file", "other-chip", "other-drive", "donor-content"]) {
      expect(voteExclusion(blocks(code)), code).toContain(`(${code})`);
    }
    for (const code of ["bit-slip", "byte-slip", "command-echo", "rotated", "byte-swapped", "bit-reversed", "inverted", "rearranged", "foreign-blocks", "different-length"]) {
      expect(voteExclusion([], [code]), code).toContain(`(${code})`);
    }
  });
  it("is who has local faults, or a repeat that may be real", () => {
    expect(voteExclusion([], ["random-flips", "one-way-flips", "lost-contact", "edge-bytes", "equal", "unclassified"])).toBeNull();
    expect(voteExclusion([{ code: "repeats-within", severity: "reason" }, { code: "size-not-power-of-two", severity: "note" }])).toBeNull();
  });
});

describe("what a lead has to answer", () => {
  const codes = (sources: CompositeSource[]) => compositeFindings(makeComposite(sources)).map((one) => [one.code, one.severity]);
  it("is that it is derived, and that margins are small", () => {
    expect(codes(noisy().slice(0, 3))).toEqual([["derived", "reason"], ["weak-bytes", "reason"]]);
    const five = [1, 2, 3, 4, 5].map((i) => read(flip(100 * i, 1), i % 2));
    expect(codes(five)).toEqual([["derived", "reason"]]);
  });
  it("is a made-up byte: a reason among much data, a block in a small area of its own", () => {
    const built = (at: number) => [1, 2, 4].map((value, i) => read({ [at]: value }, 1 + (i % 2)));
    expect(codes(built(2000))).toEqual([["derived", "reason"], ["constructed-bytes", "reason"]]);
    const alone = (n: number) => [1, 2, 4].map((value, i) => {
      const bytes = fill(4096, 0xff);
      bytes.set(stream("island", n), 1000);
      bytes[1010] = value;
      return { bytes, sha256: sha256Hex(bytes), seating: 1 + (i % 2) };
    });
    expect(codes(alone(200))).toContainEqual(["constructed-bytes", "blocks"]);
    expect(codes(alone(300))).toContainEqual(["constructed-bytes", "reason"]);
    // two FF in a row are data, sixteen are not
    const holed = (n: number) => built(2000).map((one) => ({ ...one, bytes: one.bytes.slice().fill(0xff, 1990 - n, 1990).fill(0, 2010, 2010 + n) }));
    expect(codes(holed(15))).toContainEqual(["constructed-bytes", "reason"]);
    expect(codes(holed(16))).toContainEqual(["constructed-bytes", "blocks"]);
  });
  it("is a made-up byte anywhere in an image that is small as a whole", () => {
    const cut = (n: number) => [1, 2, 4].map((value, i) => read({ 700: value }, 1 + (i % 2))).map((one) => ({ ...one, bytes: one.bytes.slice(0, n) }));
    expect(codes(cut(2048))).toContainEqual(["constructed-bytes", "blocks"]);
    expect(codes(cut(2049))).toContainEqual(["constructed-bytes", "reason"]);
  });
  it("names the places", () => {
    const [, weak] = compositeFindings(makeComposite(noisy()));
    expect(weak.message).toBe("4 bytes won by a margin of 1 or 2 votes, at 0x00A, 0x014, 0x01E, 0x01F.");
    expect(weak.ranges).toEqual([10, 20, 30, 31].map((start) => ({ start, length: 1 })));
  });
});
