import { describe, expect, it } from "vitest";
import { approvalConditions, approvalRefusal, donorSaved, type ApprovalAsked, type ApprovalFacts } from "@/lib/core/approval";
import { DEFAULT_POLICY } from "@/lib/core/words";
import { agreed, APPROVAL, approvalFacts, found, GOOD, OTHER, own, read, SIZE, transfer } from "./facts";

const LEAD = { id: "ines" };
const ASKED: ApprovalAsked = { sha256: GOOD, donorChipId: "donor-chip", reasons: {} };
const refusal = (over: Partial<ApprovalFacts>, asked: Partial<ApprovalAsked> = {}, actor = LEAD) =>
  approvalRefusal(approvalFacts(over), actor, { ...ASKED, ...asked });
const donor = (over: Partial<NonNullable<ApprovalFacts["donor"]>>) => ({ donor: { ...approvalFacts().donor!, ...over } });

describe("an approval", () => {
  it("opens when every line is met", () => {
    expect(refusal({})).toBeNull();
    expect(approvalConditions(approvalFacts()).filter((line) => line.state !== "met")).toEqual([]);
  });

  it.each<[string, Partial<ApprovalFacts>, RegExp]>([
    ["while one stands", { approval: APPROVAL }, /stands already/],
    ["while a written one stands", { transfer: transfer() }, /stands already/],
    ["on a log whose check is not clean", { chainClean: false }, /assessment/],
    ["of an unread chip", { reads: [] }, /Nothing read yet/],
    ["while reads disagree", { reads: [...agreed(), read({ number: 4, sha256: OTHER })] }, /Reads disagree/],
    ["of too few reads", { reads: agreed().slice(1) }, /2 of 3 reads/],
    ["of reads from one seating", { reads: agreed({ seating: 1 }) }, /1 of 2 seatings/],
    ["while a finding blocks", { reads: agreed({ findings: [found("blank", "blocks")] }) }, /stands against it: Read 1/],
    ["while a stored image is damaged", { imageSound: false }, /damaged or missing/],
    ["without a donor", { donor: null }, /No donor chip is paired/],
    ["for a donor chip of another size", donor({ sizeBytes: SIZE * 2 }), /16 KiB, the original 8 KiB/],
    ["while the donor's own content is not saved", donor({ savedReads: [own(1)] }), /two equal full-size reads/],
    ["while the donor's own reads differ", donor({ savedReads: [own(1), own(2), own(3, { sha256: OTHER })] }), /isn’t saved/],
    ["for a donor written before it was saved", donor({ savedReads: [], firstTransferDone: true }), /Pair another donor chip/],
  ])("is refused %s", (_name, over, sentence) => expect(refusal(over)).toMatch(sentence));

  it("is refused for an image that is no longer the agreed one", () => {
    expect(refusal({}, { sha256: OTHER })).toMatch(/changed meanwhile/);
  });
  it("is refused for a donor chip that is no longer the paired one", () => {
    expect(refusal({}, { donorChipId: "another" })).toMatch(/no longer the paired one/);
  });
  it("refuses the person who took the reads, set aside or not", () => {
    expect(refusal({ takers: ["mira", "ines"] })).toMatch(/Ask another lead/);
    const policy = { ...DEFAULT_POLICY, twoPersonRule: false };
    expect(refusal({ policy, takers: ["ines"] })).toBeNull();
    expect(approvalConditions(approvalFacts({ policy })).find((line) => line.key === "two-people")?.value).toMatch(/switched off/);
  });
  it("needs a text for each finding of severity reason, and takes no blanks for one", () => {
    const reads = agreed({ findings: [found("copy-not-a-read", "reason"), found("other-drive", "reason")] });
    expect(refusal({ reads })).toMatch(/at least 10 characters/);
    expect(refusal({ reads }, { reasons: { "copy-not-a-read": "The file was sent twice." } })).toMatch(/Found other-drive/);
    expect(refusal({ reads }, { reasons: { "copy-not-a-read": " ".repeat(20), "other-drive": "One drive, recorded twice." } })).toMatch(/Found copy-not-a-read/);
    expect(refusal({ reads }, { reasons: { "copy-not-a-read": "The file was sent twice.", "other-drive": "One drive, recorded twice." } })).toBeNull();
  });
  it("asks for a reason where all reads come from the one seating that policy wants", () => {
    const over = { policy: { ...DEFAULT_POLICY, seatings: 1 }, reads: agreed({ seating: 1 }) };
    expect(refusal(over)).toMatch(/one seating/);
    expect(refusal(over, { reasons: { "one-seating": "The chip can't be re-seated." } })).toBeNull();
  });
  it("no reason lifts a block", () => {
    const reads = agreed({ findings: [found("too-short", "blocks"), found("copy-not-a-read", "reason")] });
    expect(refusal({ reads }, { reasons: { "too-short": "Short but fine, I am sure.", "copy-not-a-read": "The file was sent twice." } })).not.toBeNull();
  });
  it("is the way on after the approval behind a write was revoked", () => {
    expect(refusal({ transfer: transfer({ approvalStands: false }) })).toBeNull();
  });
});

describe("the donor's own content", () => {
  it.each<[string, Parameters<typeof donorSaved>[0], boolean]>([
    ["two equal full-size reads", [own(1), own(2)], true],
    ["two equal reads in one seating", [own(1, { seating: 1 }), own(2, { seating: 1 })], true],
    ["a differing one set aside", [own(1), own(2), own(3, { sha256: OTHER, counted: false })], true],
    ["one read", [own(1)], false],
    ["two that differ", [own(1), own(2, { sha256: OTHER })], false],
    ["two equal and a counted one that differs", [own(1), own(2), own(3, { sha256: OTHER })], false],
    ["two equal short reads", [own(1, { sizeBytes: 1 }), own(2, { sizeBytes: 1 })], false],
    ["one of two set aside", [own(1), own(2, { counted: false })], false],
    ["reads of another stage", [own(1, { stage: "after" }), own(2, { stage: "after" })], false],
  ])("%s", (_name, reads, saved) => expect(donorSaved(reads, SIZE)).toBe(saved));
});

describe("the lines of the approval section", () => {
  const line = (over: Partial<ApprovalFacts>, key: string) => approvalConditions(approvalFacts(over)).find((one) => one.key === key);
  it("counts what is there and names what is open", () => {
    expect(line({ reads: agreed().slice(0, 2) }, "agreeing-reads")).toMatchObject({ value: "2 of 3", state: "open" });
    expect(line({}, "seatings")).toMatchObject({ value: "A, B", state: "met" });
    expect(line({ reads: [...agreed(), read({ number: 4, sha256: OTHER })] }, "differing-set-aside")).toMatchObject({ value: "Read 4 is open", state: "against" });
    expect(line({ reads: [read({ sizeBytes: 4096, sha256: OTHER })] }, "whole-chip")).toMatchObject({ value: "Read 1 of another size", state: "against" });
    expect(line({}, "donor-saved")).toMatchObject({ value: "Own 1, Own 2", state: "met" });
    expect(line({ donor: null }, "donor-paired")).toMatchObject({ value: "none yet", state: "open" });
    expect(line({ reads: agreed({ findings: [found("copy-not-a-read", "reason")] }) }, "findings")?.state).toBe("open");
  });
});
