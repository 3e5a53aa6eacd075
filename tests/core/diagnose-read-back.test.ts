import { describe, expect, it } from "vitest";
import { diagnoseReadBack } from "@/lib/core/diagnose-read-back";
import { crc32Hex, crc32Of } from "@/lib/core/digest";
import { judgeReadBack } from "@/lib/core/findings";
import { inspectWhole } from "@/lib/core/inspect";
import { pageWrap, protectedPart } from "@/lib/core/read-back-writes";
import { wrapPages } from "./golden/recipes";
import { fill, goldenImage, sha256Hex, stream } from "./stream";

const size = 0x80000;
const approved = stream("bench-seed-1", size);
const old = stream("bench-seed-2", size);
function edited(edit: (bytes: Uint8Array) => void): Uint8Array {
  const out = approved.slice();
  edit(out);
  return out;
}
const told = (readBack: Uint8Array, before: Uint8Array | null = old) => diagnoseReadBack(readBack, approved, before);

describe("a write", () => {
  it("that left one sector erased", () => {
    const found = told(edited((b) => b.fill(0xff, 0x44000, 0x45000)));
    expect(found.code).toBe("erased-only");
    // 10 bytes of that sector are FF in the image itself
    expect(approved.subarray(0x44000, 0x45000).filter((value) => value === 0xff)).toHaveLength(10);
    expect(found.message).toBe("4,086 bytes are FF, all in 0x44000–0x44FFF: one sector stayed erased.");
    expect(found.ranges).toEqual([{ start: 0x44000, length: 0x1000 }]);
    expect(told(edited((b) => b.fill(0xff, 0x40000, 0x50000))).ranges).toEqual([{ start: 0x40000, length: 0x10000 }]);
    expect(told(edited((b) => b.fill(0xff, 0x44000, 0x47000)))).toMatchObject({ code: "erased-only", ranges: [{ start: 0x44000, length: 0x3000 }] });
    expect(told(edited((b) => b.fill(0xff, 0x44000, 0x47000))).message).toMatch(/a row of sectors stayed erased\.$/);
    expect(told(edited((b) => b.fill(0xff, 0x44000, 0x44800))).code).toBe("lost-contact");
  });
  it.each([[64, 32], [256, 128], [128, 16], [256, 64]])("of pages of %i to a chip of %i wraps", (tool, chip) => {
    expect(told(wrapPages(approved, old, tool, chip))).toMatchObject({ code: "page-wrap", measured: `pages of ${tool} written to pages of ${chip}` });
    expect(told(wrapPages(approved, fill(size, 0xff), tool, chip), null).code).toBe("page-wrap");
  });
  it("wraps in a last page that isn't whole", () => {
    const [image, before] = [approved.slice(0, 1000), old.slice(0, 1000)];
    expect(pageWrap(wrapPages(image, before, 64, 16), image, before)).toEqual({ tool: 64, chip: 16 });
    expect(pageWrap(image, image, before)).toBeNull();
  });
  it.each<[string, number, number]>([["upper half", 0x40000, 0x80000], ["upper 1/64", 0x7e000, 0x80000], ["lower quarter", 0, 0x20000], ["all but the first 1/64", 0x2000, 0x80000]])(
    "that was kept from the %s", (_name, from, to) => {
      const found = told(edited((b) => b.set(old.subarray(from, to), from)));
      expect(found).toMatchObject({ code: "partly-protected", ranges: [{ start: from, length: to - from }] });
      expect(found.message).toContain("still holds what was there before");
    });
  it("that was refused in the middle", () => {
    expect(told(edited((b) => b.set(old.subarray(0x3000, 0x5000), 0x3000))).message).toMatch(/refused in part/);
    expect(told(edited((b) => b.set(old.subarray(0x3000, 0x5000), 0x3000)), null).code).toBe("foreign-blocks");
  });
  it("that was not erased, in whole or in part", () => {
    const both = approved.map((value, i) => value & old[i]);
    // READ-FAULTS B.5, computed there
    expect(crc32Hex(crc32Of(both.subarray(0, 256)))).toBe("49bd5957");
    expect(told(both)).toMatchObject({ code: "not-erased", measured: "every byte is approved AND old" });
    expect(told(edited((b) => { for (let i = 0x3000; i < 0x4000; i += 1) b[i] &= old[i]; })).message).toMatch(/a part of the chip was not erased/);
  });
  it("with few single bits off has weak cells", () => {
    const bits = (n: number) => told(edited((b) => { for (let i = 0; i < n; i += 1) b[i * 5000] ^= 1 << (i % 8); }), null);
    expect(bits(3)).toMatchObject({ code: "weak-cells", measured: "3 bytes off by one bit" });
    expect([bits(64).code, bits(65).code]).toEqual(["weak-cells", "random-flips"]);
  });
  it("read back with another size, or in a way nothing explains", () => {
    expect(told(approved.slice(0, 4096)).code).toBe("differs");
    expect(told(edited((b) => b.set([b[900] ^ 0x33, b[901] ^ 0x33, b[902] ^ 0x33], 900))).code).toBe("differs");
  });
  it("keeps an unusable old content out", () => expect(told(edited((b) => { b[9] ^= 1; }), old.slice(0, 100)).code).toBe("weak-cells"));
  it("knows no protected part where nothing was refused", () => {
    expect(protectedPart(old, approved, old)).toBeNull();
    expect(protectedPart(edited((b) => b.set(old.subarray(0x40001), 0x40001)), approved, old)).toBeNull();
  });
});

describe("the finding on a read-back", () => {
  const readBack = edited((b) => b.fill(0xff, 0x44000, 0x45000));
  const input = {
    facts: inspectWhole(readBack), read: { sha256: sha256Hex(readBack), sizeBytes: size }, approved: { sha256: sha256Hex(approved), sizeBytes: size },
    donorSaved: [], equalsAnd: false, otherApproved: null, comparison: { differingBytes: 4086, first: 0x44000, last: 0x44fff },
  };
  it("carries the diagnosis of the bytes", () => {
    expect(judgeReadBack({ ...input, diagnosis: told(readBack) })).toMatchObject([{ code: "erased-only", severity: "blocks", ranges: [{ start: 0x44000 }] }]);
    expect(judgeReadBack({ ...input, diagnosis: told(readBack), poweredOn: true })).toMatchObject([{ code: "erased-only", severity: "note" }]);
    expect(judgeReadBack(input)).toMatchObject([{ code: "differs" }]);
  });
  it("names another approved image first", () => {
    expect(judgeReadBack({ ...input, diagnosis: told(readBack), otherApproved: { designator: "U7", caseRef: "26-0181" } })).toMatchObject([{ code: "other-image" }]);
  });
});

it("a golden image written with every byte the other way round is told by the order of its bytes", () => {
  const good = goldenImage();
  expect(diagnoseReadBack(good.map((_, i) => good[i ^ 1]), good, null)).toMatchObject({ code: "byte-swapped" });
});
