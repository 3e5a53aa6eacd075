import { describe, expect, it } from "vitest";
import { judgeRead, judgeReadBack, oneSeatingFinding, type JudgeInput, type ReadBackInput } from "@/lib/core/findings";
import { inspectWhole } from "@/lib/core/inspect";
import { DEFAULT_POLICY, type Finding, type Stage } from "@/lib/core/words";
import { DONOR, GOOD, OTHER } from "./facts";
import { likeFirmware } from "../support/firmware";
import { fill, goldenImage, stream } from "./stream";

const SIZE = 8192;
function judge(bytes: Uint8Array, over: Partial<JudgeInput> = {}): Finding[] {
  return judgeRead({
    stage: "before", read: { sizeBytes: bytes.length, sha256: GOOD, fileName: "u3.bin", modifiedAt: "2026-03-12T13:48:00Z" },
    chip: { sizeBytes: SIZE, sizeSource: "marking" }, facts: inspectWhole(bytes), policy: DEFAULT_POLICY, earlier: [], elsewhere: [], ...over,
  });
}
/** not plain noise, which would be held against it */
const data = (n: number) => likeFirmware(stream("s", n));
const said = (findings: Finding[]) => findings.map((one) => `${one.code} ${one.severity}`);

describe("a read by itself", () => {
  it("has nothing against a good image", () => expect(judge(goldenImage())).toEqual([]));
  it.each([[0xff, "blank"], [0x00, "all-zero"], [0x55, "constant"]])("all %i is %s and blocks", (value, code) => {
    expect(said(judge(fill(SIZE, value)))).toEqual([`${code} blocks`]);
  });
  it("says all FF in one plain sentence and what to do", () => {
    const [one] = judge(fill(SIZE, 0xff));
    expect(one.message).toBe("All FF.");
    expect(one.advice).toContain("Check pin 8 and read again.");
    expect([one.measured, one.threshold]).toEqual(["all 8,192 bytes are FF", "every byte equal"]);
  });
  it("never blocks a nearly blank image; fewer than 64 other bytes ask for a reason", () => {
    const bytes = fill(SIZE, 0xff);
    bytes.set([1, 2, 3, 4], 100);
    expect(said(judge(bytes))).toEqual(["nearly-blank reason"]);
    const store = fill(131_072, 0xff);
    const chip = { sizeBytes: store.length, sizeSource: "marking" as const };
    store.fill(0, 0, 63);
    expect(said(judge(store, { chip }))).toEqual(["nearly-blank reason"]);
    store.fill(0, 0, 64);
    expect(said(judge(store, { chip }))).toEqual(["nearly-blank note"]);
  });
  it.each<[string, Uint8Array, string]>([
    ["one byte short", data(SIZE - 1), "too-short"],
    ["half the chip", data(SIZE / 2), "too-short"],
    ["padded by 512", data(SIZE + 512).fill(0xff, SIZE), "padded"],
    ["a header more", data(SIZE + 64), "extra-bytes"],
    ["longer by a byte", data(SIZE + 1), "padded"],
  ])("%s blocks", (_name, bytes, code) => expect(said(judge(bytes))).toEqual([`${code} blocks`]));
  it("says where a short read ends, and that the size was only typed", () => {
    const [one] = judge(data(0x50000), { chip: { sizeBytes: 524_288, sizeSource: "typed" } });
    expect(one.message).toBe("Ends at 0x4FFFF: 320 KiB of 512 KiB.");
    expect(one.advice).toContain("The size was only typed");
    expect(one.ranges).toEqual([{ start: 0x50000, length: 0x30000 }]);
    expect(judge(data(10))[0].advice).not.toContain("typed");
  });
  it("notes a chip whose size is no power of two", () => {
    expect(said(judge(data(540_672), { chip: { sizeBytes: 540_672, sizeSource: "id" } }))).toEqual(["size-not-power-of-two note"]);
  });
  it("gates only reads of the original; of the donor's own the size", () => {
    const blank = (stage: Stage) => said(judge(fill(SIZE / 2, 0xff), { stage }));
    expect(blank("before")).toEqual(["blank blocks", "too-short blocks"]);
    expect(blank("donor")).toEqual(["blank note", "too-short blocks"]);
    expect(blank("after")).toEqual(["blank note", "too-short note"]);
  });
});

describe("a copy is not a second read", () => {
  const twin = { number: 1, stage: "before" as const, sha256: GOOD, fileName: "u3.bin", modifiedAt: "2026-03-12T13:48:00Z", counted: true };
  const copies = (over: Partial<typeof twin>) => said(judge(goldenImage(), { earlier: [{ ...twin, ...over }] }));
  it("where digest, name and modification time are equal", () => expect(copies({})).toEqual(["copy-not-a-read reason"]));
  it.each([["digest", { sha256: OTHER }], ["name", { fileName: "u3-2.bin" }], ["time", { modifiedAt: "2026-03-12T13:51:00Z" }], ["stage", { stage: "donor" as never }]])(
    "but another %s makes it one", (_name, over) => expect(copies(over)).toEqual([]));
  it("and nothing is said without a known time", () => {
    const read = { sizeBytes: SIZE, sha256: GOOD, fileName: "u3.bin", modifiedAt: null };
    expect(judge(goldenImage(), { read, earlier: [{ ...twin, modifiedAt: null as never }] })).toEqual([]);
  });
});

describe("images found elsewhere", () => {
  const hit = { relation: "other-drive" as const, readName: "Read 1", designator: "U7", caseRef: "26-0181", sameSerial: false };
  it("blocks another chip's, another drive's and a donor's content", () => {
    const elsewhere = [hit, { ...hit, relation: "other-chip" as const }, { ...hit, relation: "donor-content" as const }];
    expect(said(judge(goldenImage(), { elsewhere }))).toEqual(["other-chip blocks", "other-drive blocks", "donor-content blocks"]);
  });
  it("asks for a reason where both drives carry one serial, but not if a third is among them", () => {
    expect(said(judge(goldenImage(), { elsewhere: [{ ...hit, sameSerial: true }] }))).toEqual(["other-drive reason"]);
    expect(said(judge(goldenImage(), { elsewhere: [{ ...hit, sameSerial: true }, hit] }))).toEqual(["other-drive blocks"]);
  });
  it("says nothing of uniform and nearly blank images, nor of the donor's and read-back stages", () => {
    expect(said(judge(fill(SIZE, 0xff), { elsewhere: [hit] }))).toEqual(["blank blocks"]);
    const nearly = fill(SIZE, 0xff);
    nearly[9] = 0;
    expect(said(judge(nearly, { elsewhere: [hit] }))).toEqual(["nearly-blank reason"]);
    expect(judge(goldenImage(), { elsewhere: [hit], stage: "after" })).toEqual([]);
    expect(judge(goldenImage(), { elsewhere: [hit], stage: "donor" })).toEqual([]);
  });
  it("names read, chip and case, and no more than a few", () => {
    const [one] = judge(goldenImage(), { elsewhere: Array.from({ length: 6 }, () => hit) });
    expect(one.message).toBe("Equals Read 1 of U7, case 26-0181, Read 1 of U7, case 26-0181, Read 1 of U7, case 26-0181 and 3 more, another drive.");
  });
});

describe("one seating", () => {
  const seated = (...seatings: number[]) => seatings.map((seating) => ({ seating }));
  it("is raised only where policy asks for one", () => {
    expect(oneSeatingFinding({ ...DEFAULT_POLICY, seatings: 1 }, seated(1, 1, 1))?.severity).toBe("reason");
    expect(oneSeatingFinding({ ...DEFAULT_POLICY, seatings: 1 }, seated(1, 2))).toBeNull();
    expect(oneSeatingFinding(DEFAULT_POLICY, seated(1, 1, 1))).toBeNull();
    expect(oneSeatingFinding({ ...DEFAULT_POLICY, seatings: 1 }, [])).toBeNull();
  });
});

describe("a read-back", () => {
  const approved = { sha256: GOOD, sizeBytes: SIZE };
  function judgeBack(over: Partial<ReadBackInput> = {}): Finding[] {
    return judgeReadBack({
      facts: inspectWhole(goldenImage()), read: { sha256: OTHER, sizeBytes: SIZE }, approved, donorSaved: [DONOR], equalsAnd: false, otherApproved: null,
      comparison: { differingBytes: 81, first: 0x400, last: 0x4ff }, ...over,
    });
  }
  const blank = inspectWhole(fill(SIZE, 0xff));
  it.each<[string, Partial<ReadBackInput>, string]>([
    ["equal to the approved image", { read: approved }, "verified note"],
    ["equal to the donor's old content", { read: { sha256: DONOR, sizeBytes: SIZE } }, "write-refused blocks"],
    ["approved AND old", { equalsAnd: true }, "not-erased blocks"],
    ["all FF", { facts: blank }, "erased-only blocks"],
    ["all FF of a donor that was blank", { facts: blank, read: { sha256: DONOR, sizeBytes: SIZE } }, "write-refused blocks"],
    ["another approved image", { otherApproved: { designator: "U7", caseRef: "26-0181" } }, "other-image blocks"],
    ["something else", {}, "differs blocks"],
    ["of another size", { read: { sha256: OTHER, sizeBytes: 4096 }, comparison: null }, "differs blocks"],
    ["something else after power-on", { poweredOn: true }, "differs note"],
    ["equal after power-on", { read: approved, poweredOn: true }, "verified note"],
  ])("%s", (_name, over, expected) => expect(said(judgeBack(over))).toEqual([expected]));
  it("says in how many bytes and where it differs", () => {
    expect(judgeBack()[0].message).toBe("Differs from the approved image in 81 bytes, all in 0x0400–0x04FF.");
    expect(judgeBack({ read: approved })[0].message).toBe("Equals the approved image in all 8,192 bytes.");
  });
});
