import { describe, expect, it } from "vitest";
import { agreement, BENCH_GROUPS, deriveChipState, oddOneOut, openFindings, STATE_LABEL, type StateFacts } from "@/lib/core/chip-state";
import { CHIP_STATES, DEFAULT_POLICY, type ChipStateCode } from "@/lib/core/words";
import { agreed, APPROVAL, back, facts, found, GOOD, OTHER, read, transfer } from "./facts";

const policy = (over: Partial<typeof DEFAULT_POLICY>) => ({ ...DEFAULT_POLICY, ...over });
const equalBacks = [back(1), back(2)];

/** Each line of the product's table, with the cases at its border. */
const LINES: [string, StateFacts, ChipStateCode][] = [
  ["two equal read-backs in two seatings", facts({ approval: APPROVAL, transfer: transfer({ readBacks: equalBacks }) }), "verified"],
  ["a third equal read-back", facts({ approval: APPROVAL, transfer: transfer({ readBacks: [...equalBacks, back(3)] }) }), "verified"],
  ["a differing read-back that is set aside", facts({ approval: APPROVAL, transfer: transfer({ readBacks: [...equalBacks, back(3, { sha256: OTHER, counted: false })] }) }), "verified"],
  ["a differing read-back after power-on", facts({ approval: APPROVAL, transfer: transfer({ poweredOn: true, readBacks: [...equalBacks, back(3, { sha256: OTHER, findings: [found("differs", "note")] })] }) }), "verified"],
  ["one read-back where policy asks for one", facts({ policy: policy({ readBacks: 1, readBackSeatings: 1 }), approval: APPROVAL, transfer: transfer({ readBacks: [back(1)] }) }), "verified"],
  ["a differing read-back", facts({ approval: APPROVAL, transfer: transfer({ readBacks: [back(1, { sha256: OTHER })] }) }), "failed"],
  ["a differing read-back beside enough equal ones", facts({ approval: APPROVAL, transfer: transfer({ readBacks: [...equalBacks, back(3, { sha256: OTHER })] }) }), "failed"],
  ["a difference found before power-on", facts({ approval: APPROVAL, transfer: transfer({ poweredOn: true, readBacks: [...equalBacks, back(3, { sha256: OTHER, findings: [found("differs", "blocks")] })] }) }), "failed"],
  ["a revoked approval behind equal read-backs", facts({ transfer: transfer({ approvalStands: false, readBacks: equalBacks }) }), "failed"],
  ["a revoked approval behind a write not read back", facts({ transfer: transfer({ approvalStands: false }) }), "failed"],
  ["written, nothing read back", facts({ approval: APPROVAL, transfer: transfer() }), "written"],
  ["one of two read-backs", facts({ approval: APPROVAL, transfer: transfer({ readBacks: [back(1)] }) }), "written"],
  ["two read-backs in one seating", facts({ approval: APPROVAL, transfer: transfer({ readBacks: [back(1), back(2, { seating: 1 })] }) }), "written"],
  ["an equal read-back that is set aside", facts({ approval: APPROVAL, transfer: transfer({ readBacks: [back(1), back(2, { counted: false })] }) }), "written"],
  ["a standing approval", facts({ approval: APPROVAL }), "approved"],
  ["nothing read", facts({ reads: [] }), "unread"],
  ["every read set aside", facts({ reads: agreed({ counted: false }) }), "unread"],
  ["only reads of another stage", facts({ reads: [read({ stage: "donor" })] }), "unread"],
  ["three that agree and one that differs", facts({ reads: [...agreed(), read({ number: 4, sha256: OTHER })] }), "reads-disagree"],
  ["two that differ", facts({ reads: [read(), read({ number: 2, sha256: OTHER })] }), "reads-disagree"],
  ["the differing read set aside", facts({ reads: [...agreed(), read({ number: 4, sha256: OTHER, counted: false })] }), "ready"],
  ["a block on one read", facts({ reads: [read({ findings: [found("blank", "blocks")] })] }), "held"],
  ["a block on enough agreeing reads", facts({ reads: agreed({ findings: [found("blank", "blocks")] }) }), "held"],
  ["a block on a read that is set aside", facts({ reads: [...agreed(), read({ number: 4, counted: false, findings: [found("blank", "blocks")] })] }), "ready"],
  ["two of three reads", facts({ reads: agreed().slice(1) }), "needs-reads"],
  ["three reads in one seating", facts({ reads: agreed({ seating: 1 }) }), "needs-reads"],
  ["too few reads with a reason open", facts({ reads: [read({ findings: [found("copy-not-a-read", "reason")] })] }), "needs-reads"],
  ["a reason on enough agreeing reads", facts({ reads: agreed({ findings: [found("copy-not-a-read", "reason")] }) }), "held"],
  ["one seating where policy asks for one", facts({ policy: policy({ seatings: 1 }), reads: agreed({ seating: 1 }) }), "held"],
  ["two seatings where policy asks for one", facts({ policy: policy({ seatings: 1 }) }), "ready"],
  ["a note only", facts({ reads: agreed({ findings: [found("size-not-power-of-two", "note")] }) }), "ready"],
  ["all agree and nothing stands against it", facts(), "ready"],
];

describe("the state of a chip", () => {
  it.each(LINES)("%s: %#", (_name, given, state) => {
    const derived = deriveChipState(given);
    expect(derived.state).toBe(state);
    expect(derived.label).toBe(STATE_LABEL[state]);
    expect(derived.sentence).toMatch(/^[A-Z0-9].*\.$/);
    expect(derived.sentence).not.toMatch(/!|undefined|NaN|\bnull\b/);
  });
  it("has a case for every state", () => {
    expect(new Set(LINES.map(([, , state]) => state))).toEqual(new Set(CHIP_STATES));
  });

  /** What makes each line apply, put on top of the lines below it. */
  const disagreeing = [...agreed(), read({ number: 4, sha256: OTHER })];
  const order: [ChipStateCode, Partial<StateFacts>][] = [
    ["ready", {}],
    ["held", { reads: agreed({ findings: [found("copy-not-a-read", "reason")] }) }],
    ["needs-reads", { reads: agreed({ findings: [found("copy-not-a-read", "reason")] }).slice(1) }],
    ["held", { reads: agreed({ findings: [found("copy-not-a-read", "reason"), found("blank", "blocks")] }).slice(1) }],
    ["reads-disagree", { reads: disagreeing.map((one) => ({ ...one, findings: [found("blank", "blocks")] })) }],
    ["unread", { reads: disagreeing.map((one) => ({ ...one, counted: false })) }],
    ["approved", { approval: APPROVAL }],
    ["written", { transfer: transfer() }],
    ["failed", { transfer: transfer({ readBacks: [...equalBacks, back(3, { sha256: OTHER })] }) }],
    ["verified", { transfer: transfer({ readBacks: equalBacks }) }],
  ];
  it("asks its lines in the table's order: a higher one hides all below", () => {
    let given = facts();
    for (const [state, more] of order) {
      given = { ...given, ...more };
      expect(deriveChipState(given).state).toBe(state);
    }
  });
});

describe("its sentences", () => {
  const sentence = (over: Partial<StateFacts>) => deriveChipState(facts(over)).sentence;
  it("says where the odd read differs and what it looks like", () => {
    const reads = [read({ number: 1 }), read({ number: 2, sha256: OTHER }), read({ number: 3, seating: 2 })];
    const worst = { oddRead: 2, otherRead: 1, differingBytes: 214, first: 0x1f03a, last: 0x1fff9, looksLike: "lost contact" };
    expect(sentence({ reads, worst, sizeBytes: 524_288 }))
      .toBe("Read 2 differs in 214 bytes, all in 0x1F000–0x1FFFF: looks like lost contact. Re-seat the clip and read again.");
    expect(sentence({ reads })).toBe("Read 2 differs from Reads 1 and 3. Re-seat the clip and read again.");
  });
  it("blames neither of two that differ", () => {
    const reads = [read({ number: 1 }), read({ number: 2, sha256: OTHER })];
    const worst = { oddRead: 2, otherRead: 1, differingBytes: 1, first: 5, last: 5, looksLike: null };
    expect(sentence({ reads, worst })).toBe("Reads 1 and 2 differ in 1 byte, at 0x0005. Re-seat the clip and read again.");
    expect(sentence({ reads })).toBe("Read 1 and Read 2 differ. Re-seat the clip and read again.");
  });
  it("counts reads and seatings that are missing", () => {
    expect(sentence({ reads: agreed().slice(0, 2) })).toBe("2 of 3 reads, 1 of 2 seatings: read again in a new seating.");
    expect(sentence({ reads: agreed().slice(1) })).toBe("2 of 3 reads, 2 of 2 seatings: read again.");
    expect(sentence({ reads: [] })).toBe("Nothing read yet. Take 3 reads in 2 seatings.");
    expect(sentence({ reads: agreed({ counted: false }) })).toMatch(/^Every read is set aside\./);
  });
  it("says that the donor holds an image no longer cleared", () => {
    const revoked = { transfer: transfer({ approvalStands: false, readBacks: equalBacks }) };
    expect(sentence(revoked)).toBe("The donor holds an image that is no longer cleared. Have an image approved, then write again.");
    expect(sentence({ ...revoked, approval: APPROVAL })).toContain("Write the image that is cleared now");
  });
  it("hands on what a read-back showed", () => {
    const bad = back(1, { sha256: OTHER, findings: [{ code: "not-erased", severity: "blocks", message: "Equals approved AND old content: the chip was not erased.", advice: "Erase." }] });
    expect(sentence({ approval: APPROVAL, transfer: transfer({ readBacks: [bad] }) })).toBe("Back 1: Equals approved AND old content: the chip was not erased. Erase.");
  });
});

describe("agreement", () => {
  it("groups counted reads, the largest first, with their seatings", () => {
    const reads = [read({ number: 1, sha256: OTHER }), read({ number: 2 }), read({ number: 3, seating: 2 }), read({ number: 4, counted: false })];
    expect(agreement(reads).groups).toEqual([{ sha256: GOOD, reads: [2, 3], seatings: [1, 2], behind: 2 }, { sha256: OTHER, reads: [1], seatings: [1], behind: 1 }]);
    expect(oddOneOut(reads)).toBe(1);
  });
  it("lets a composite stand for the reads that were voted into it, and no more", () => {
    const composite = read({ number: 6, voters: { reads: 5, seatings: [1, 2] } });
    expect(agreement([composite]).largest).toEqual({ sha256: GOOD, reads: [6], seatings: [1, 2], behind: 5 });
    expect(deriveChipState(facts({ reads: [composite] })).state).toBe("ready");
    expect(deriveChipState(facts({ reads: [read({ number: 6, voters: { reads: 2, seatings: [1, 2] } })] })).state).toBe("needs-reads");
    expect(deriveChipState(facts({ reads: [composite, read({ number: 7, sha256: OTHER })] })).state).toBe("reads-disagree");
  });
  it("names no odd one where no group is largest or all agree", () => {
    expect(oddOneOut([read(), read({ number: 2, sha256: OTHER })])).toBeNull();
    expect(oddOneOut(agreed())).toBeNull();
    expect(agreement([]).largest).toBeNull();
  });
  it("lists blocks before reasons and leaves notes out", () => {
    const reads = [read({ findings: [found("copy-not-a-read", "reason"), found("size-not-power-of-two", "note")] }), read({ number: 2, findings: [found("blank", "blocks")] })];
    expect(openFindings(facts({ reads })).map((open) => open.finding.code)).toEqual(["blank", "copy-not-a-read"]);
  });
  it("puts every state into exactly one bench group", () => {
    for (const state of CHIP_STATES) expect(BENCH_GROUPS.filter((group) => group.states.includes(state))).toHaveLength(1);
    expect(BENCH_GROUPS.at(-1)).toMatchObject({ label: "To return", states: ["verified"] });
  });
});

it("sends nobody to the lead while the donor's side of an approval is open", () => {
  const sentence = (donorSide: StateFacts["donorSide"]) => deriveChipState({ ...facts(), donorSide }).sentence;
  expect(sentence("none")).toMatch(/Record the donor’s chip that is to take the image and save what it holds, then ask a lead/);
  expect(sentence("unsaved")).toMatch(/Save the donor chip’s own content by two equal reads, then ask a lead/);
  for (const open of ["none", "unsaved"] as const) expect(sentence(open)).not.toContain("nothing stands against approval");
  expect(sentence("saved")).toMatch(/nothing stands against approval\. Ask a lead/);
});

it("asks for nothing that was asked already, and for no transfer of a chip that is kept or whose case is closed", () => {
  expect(deriveChipState({ ...facts(), asked: true }).sentence).toMatch(/approval\. Approval was asked for: a lead who took none of them signs or sends it back\.$/);
  expect(deriveChipState({ ...facts(), kept: true, donorSide: "none" }).sentence).toMatch(/agree in 2 seatings\. Kept for reference: nothing is to be written\.$/);
  const readBacks = [read({ stage: "after", seating: 1 }), read({ stage: "after", number: 2, seating: 2 })];
  const transfer = { approvedSha256: readBacks[0].sha256, approvalStands: true, poweredOn: true, readBacks };
  expect(deriveChipState({ ...facts(), transfer }).sentence).toMatch(/Pack the donor board with the drive\.$/);
  expect(deriveChipState({ ...facts(), transfer, closed: true }).sentence).toMatch(/bytes\.$/);
});
