import { describe, expect, it } from "vitest";
import { closeRefusal, type ClosingFacts, erasureDay, isAllowedOnClosed, openPoints, returnItems, unverifiedChips } from "@/lib/core/closing";
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

describe("a closed case", () => {
  const changes: Action[] = ["read.stored", "read.set-aside", "read.counted-again", "composite.made", "approval.asked", "approval.given", "approval.revoked", "approval.sent-back", "transfer.recorded", "drive.recorded", "drive.corrected", "board.recorded", "board.corrected", "chip.recorded", "chip.corrected", "chip.paired", "item.handed-over", "photo.added", "case.corrected", "case.held", "case.resumed", "case.returned", "start-up.tested", "board.taken-from-shelf", "parcel.received"];
  it("takes no change", () => {
    for (const action of changes) expect([action, ACTIONS[action] !== undefined, isAllowedOnClosed(action)]).toEqual([action, true, false]);
  });

  it("still lets out bundles, summaries and images, and takes notes", () => {
    for (const action of ["note.added", "bundle.started", "bundle.completed", "summary.sent", "image.handed-out", "share.withdrawn", "case.reopened"] as const) expect(isAllowedOnClosed(action)).toBe(true);
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
