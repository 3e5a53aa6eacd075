import { describe, expect, it } from "vitest";
import { compositeSentences, leadSentence, steps, type SummaryChip } from "@/components/summary/summary-words";
import type { SummaryView } from "@/lib/views";

const chip = (designator: string, more: Partial<SummaryChip> = {}): SummaryChip => ({
  designator, holds: null, sizeBytes: 8192, verified: true, stateLabel: "Verified", sha256: "ab".repeat(32), crc32: "0dff38c8", agreeingReads: 3, seatings: 2, readBacks: 2, composite: null,
  approvedBy: "Ines Corvo", approvedAt: "2026-03-12T13:00:00Z", transferredAt: "2026-03-13T08:00:00Z", transferKind: "write", verifiedAt: "2026-03-13T09:00:00Z", cells: null, ...more,
});
const summary = (chips: SummaryChip[], more: Partial<SummaryView> = {}): SummaryView => ({
  workshop: "Alder Lane Drive Bench", caseRef: "26-0183", customerName: "Harrow & Finch Surveyors", madeAt: "2026-03-16T10:00:00Z", expiresAt: "2026-06-14T10:00:00Z", twoPersonRule: true, seal: null,
  drives: [{ letter: "A", label: "PN 4471-0093-B", chips, head: { seq: 20, hash: "cd".repeat(32) } }], ...more,
});

describe("the customer's summary", () => {
  it("claims equality only when every chip is verified", () => {
    expect(leadSentence(summary([chip("U3"), chip("U12")]))).toContain("The content of both memory chips");
    expect(leadSentence(summary([chip("U3"), chip("U12", { verified: false })]))).toMatch(/^1 of 2 memory chips/);
    expect(leadSentence(summary([chip("U3", { verified: false })]))).toContain("not verified yet");
    expect(leadSentence(summary([]))).toContain("No chip");
  });
  it("does not speak of writing when the chip itself was moved", () => {
    const moved = summary([chip("U3", { transferKind: "chip-moved" })]);
    expect(leadSentence(moved)).toContain("now sits on a donor board");
    expect(steps(moved, "UTC").map((s) => s.text).join(" ")).not.toContain("wrote");
  });
  it("joins the same step of several chips on one day and keeps the order", () => {
    const told = steps(summary([chip("U3"), chip("U12", { approvedAt: "2026-03-12T15:00:00Z" })]), "UTC");
    expect(told.map((s) => s.day)).toEqual(["Thu 12 Mar", "Fri 13 Mar", "Fri 13 Mar"]);
    expect(told[0].text).toContain("U3 and U12");
  });
  it("never says of a composite that it was read, and says what it is", () => {
    const composite = { number: 6, reads: 5, seatings: 2 };
    const made = summary([chip("U3"), chip("U12", { composite })]);
    expect(leadSentence(made)).not.toContain("what we read");
    expect(leadSentence(made)).toContain("The image of U12 was put together from several reads");
    expect(leadSentence(summary([chip("U3", { composite, transferKind: "chip-moved" })]))).toMatch(/now sits on a donor board\. .* equals the image we approved, .* The image of U3 was put together/);
    expect(steps(made, "UTC").map((s) => s.text)).toContain("A second person, who had taken none of the reads, looked at the votes behind the composite of U12 and approved it.");
    expect(compositeSentences({ composite })).toMatch(/^Our 5 reads of this chip differed .* what repeats, not what is true/);
    expect(compositeSentences({ composite: null })).toBeNull();
  });
  it("speaks of no second person when the rule is off", () => {
    expect(steps(summary([chip("U3")], { twoPersonRule: false }), "UTC")[0].text).toMatch(/^We checked/);
  });
});
