import { describe, expect, it } from "vitest";
import { closeRefusal, type ClosingFacts, erasureDay, isAllowedOnClosed, leadingStep, openPoints, returnItems, unverifiedChips } from "@/lib/core/closing";
import { ACTIONS, type Action } from "@/lib/core/custody-actions";

const facts = (over: Partial<ClosingFacts> = {}): ClosingFacts => ({ received: true, returned: true, chips: [{ name: "U12", state: "verified" }], otherSerial: [], ...over });

describe("closing a case", () => {
  it("goes by itself once all is verified and returned", () => {
    expect(closeRefusal(facts(), "returned", null)).toBeNull();
    expect(openPoints(facts(), "returned")).toEqual([]);
  });

  it.each([
    ["nothing went back", facts({ returned: false }), "returned" as const, "Nothing is recorded as returned yet."],
    ["a chip is not verified", facts({ chips: [{ name: "U12", state: "verified" }, { name: "U3", state: "written" }] }), "returned" as const, "U3 is not verified."],
    ["another serial came back", facts({ otherSerial: ["Drive A"] }), "returned" as const, "Drive A reported another serial than its label."],
    ["it is cancelled", facts({ returned: false }), "cancelled" as const, "No return is recorded: say where the parcel is."],
    ["it ends without a transfer", facts({ chips: [] }), "without-transfer" as const, "It ends without a transfer."],
  ])("asks for more when %s", (_, given, kind, says) => {
    expect(closeRefusal(given, kind, null)).toContain(says);
  });

  it("takes a lead's reason for all but a return that was not recorded", () => {
    const open = facts({ chips: [{ name: "U3", state: "failed" }], otherSerial: ["Drive A"] });
    expect(closeRefusal(open, "returned", "The customer wants it back as it is.")).toBeNull();
    expect(unverifiedChips(open)).toEqual(["U3"]);
    expect(closeRefusal(facts({ returned: false }), "returned", "Gone.")).toContain("Record the return first");
  });

  it("counts calendar days to the erasure", () => {
    expect(erasureDay("2026-12-01", 90)).toBe("2027-03-01");
    expect(erasureDay("2028-02-28", 1)).toBe("2028-02-29");
    expect(erasureDay("2026-10-24", 1)).toBe("2026-10-25");
    expect(erasureDay("2026-10-25", 0)).toBe("2026-10-25");
  });
});

describe("the step that leads", () => {
  const all = { works: true, sends: true, returns: true, releases: true };
  const at = (over: Partial<Parameters<typeof leadingStep>[0]> = {}) => ({ received: true, returned: false, chips: [{ name: "U12", state: "verified" as const }], tests: [true], nothingToMove: false, summarySent: true, ...over });

  it.each([
    ["a chip is not verified", at({ chips: [{ name: "U12", state: "written" }], tests: [null] }), "chips"],
    ["one of two drives was not tested", at({ tests: [true, null] }), "start-up"],
    ["the customer has no summary", at({ summarySent: false }), "summary"],
    ["nothing went back", at(), "return"],
    ["all went back", at({ returned: true }), "close"],
    ["it went back untested", at({ returned: true, tests: [null] }), "close"],
    ["there is no chip to move", at({ nothingToMove: true, chips: [], tests: [], summarySent: false }), "return"],
    ["there was no chip to move and it went back", at({ nothingToMove: true, chips: [], tests: [], returned: true }), "close"],
  ] as const)("while %s", (_, given, step) => {
    expect(leadingStep(given, all)).toBe(step);
  });

  it("is nobody's while a test did not go as it should, a chip is still to be recorded or the parcel is not here", () => {
    expect(leadingStep(at({ tests: [false] }), all)).toBeNull();
    expect(leadingStep(at({ chips: [], tests: [] }), all)).toBeNull();
    expect(leadingStep(at({ nothingToMove: true, chips: [], tests: [], received: false }), all)).toBeNull();
  });

  it("is not shown to somebody who may not take it, and the next that is theirs comes instead only past the summary", () => {
    const technician = { ...all, sends: false, releases: false };
    expect(leadingStep(at({ summarySent: false }), technician)).toBe("return");
    expect(leadingStep(at({ returned: true }), technician)).toBeNull();
    const auditor = { works: false, sends: false, returns: false, releases: false };
    for (const one of [at(), at({ tests: [null] }), at({ chips: [{ name: "U12", state: "unread" }] }), at({ returned: true })]) expect(leadingStep(one, auditor)).toBeNull();
  });
});

describe("a closed case", () => {
  const changes: Action[] = ["read.stored", "read.set-aside", "read.counted-again", "composite.made", "approval.asked", "approval.given", "approval.revoked", "approval.sent-back", "transfer.recorded", "drive.recorded", "drive.corrected", "board.recorded", "board.corrected", "chip.recorded", "chip.corrected", "chip.paired", "item.handed-over", "photo.added", "case.corrected", "case.held", "case.resumed", "case.returned", "start-up.tested", "board.taken-from-shelf", "parcel.received"];
  it("takes no change", () => {
    for (const action of changes) expect([action, ACTIONS[action] !== undefined, isAllowedOnClosed(action)]).toEqual([action, true, false]);
  });

  it("still lets out bundles, summaries and images, and takes notes", () => {
    for (const action of ["note.added", "bundle.started", "bundle.completed", "summary.sent", "image.handed-out", "share.withdrawn", "case.reopened"] as const) expect(isAllowedOnClosed(action)).toBe(true);
  });

  it("lets a hand-over that was under way end, and none begin", () => {
    expect([isAllowedOnClosed("item.received"), isAllowedOnClosed("item.not-received"), isAllowedOnClosed("item.handed-over")]).toEqual([true, true, false]);
  });
});

it("lists what goes back in the words of the labels", () => {
  expect(returnItems({
    drives: [{ letter: "A", label: "PN 4471-0093-B, serial S1", original: "BX 40-3179 rev C", donor: "BX 40-3179 rev C", moved: ["U12"], replaced: ["U12"] }],
    smallBoard: true, accessories: "power supply\nUSB cable; ",
  })).toEqual([
    "Drive A, PN 4471-0093-B, serial S1", "Donor board fitted to Drive A, BX 40-3179 rev C", "Original board, BX 40-3179 rev C, without U12", "Removed donor chip U12",
    "Enclosure with its small board", "power supply", "USB cable",
  ]);
});
