import { describe, expect, it } from "vitest";
import { comesBackSentence, compositeSentences, leadSentence, notStarted, ownBoardSentence, promiseLimits, steps as stepsOf, type Summary, type SummaryChip } from "@/lib/core/summary-words";

const WEEKDAY = new Intl.DateTimeFormat("en-GB", { timeZone: "UTC", weekday: "short", day: "numeric", month: "short" });
const day = (iso: string) => WEEKDAY.format(new Date(iso)).replace(",", "");
const steps = (given: Summary) => stepsOf(given, day);

const chip = (designator: string, more: Partial<SummaryChip> = {}): SummaryChip => ({
  designator, verified: true, agreeingReads: 3, seatings: 2, readBacks: 2, composite: null,
  readBy: ["in-place"], writtenWith: null, approvedAt: "2026-03-12T13:00:00Z", transferredAt: "2026-03-13T08:00:00Z", transferKind: "write", verifiedAt: "2026-03-13T09:00:00Z", ...more,
});
const summary = (chips: SummaryChip[], more: Partial<Summary> = {}): Summary => ({
  twoPersonRule: true, comesBack: { items: [], at: null },
  drives: [{ letter: "A", chips, startUp: null }], ...more,
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
    expect(steps(moved).map((s) => s.text).join(" ")).not.toContain("wrote");
  });
  it("tells of no read-back before the last write of that day", () => {
    const told = steps(summary([
      chip("U3", { approvedAt: "2026-03-12T09:00:00Z", transferredAt: "2026-03-12T10:00:00Z", verifiedAt: "2026-03-12T11:00:00Z", transferKind: "chip-moved" }),
      chip("U12", { approvedAt: "2026-03-12T13:00:00Z", transferredAt: "2026-03-12T14:00:00Z", verifiedAt: "2026-03-12T15:00:00Z" }),
    ])).map((s) => /checked|took U3 off|wrote|back/.exec(s.text)?.[0]);
    expect(told).toEqual(["checked", "took U3 off", "wrote", "back"]);
  });

  it("joins the same step of several chips on one day and keeps the order", () => {
    const told = steps(summary([chip("U3"), chip("U12", { approvedAt: "2026-03-12T15:00:00Z" })]));
    expect(told.map((s) => s.day)).toEqual(["Thu 12 Mar", "Fri 13 Mar", "Fri 13 Mar"]);
    expect(told[0].text).toContain("U3 and U12");
  });
  it("never says of a composite that it was read, and says what it is", () => {
    const composite = { number: 6, reads: 5, seatings: 2 };
    const made = summary([chip("U3"), chip("U12", { composite })]);
    expect(leadSentence(made)).not.toContain("what we read");
    expect(leadSentence(made)).toContain("The image of U12 was put together from several reads");
    expect(leadSentence(summary([chip("U3", { composite, transferKind: "chip-moved" })]))).toMatch(/now sits on a donor board\. .* equals the image we approved, .* The image of U3 was put together/);
    expect(steps(made).map((s) => s.text)).toContain("A second person, who had taken none of the reads, looked at the votes behind the composite of U12 and approved it.");
    expect(compositeSentences({ composite })).toMatch(/^Our 5 reads of this chip differed .* what repeats, not what is true/);
    expect(compositeSentences({ composite: null })).toBeNull();
  });
  it("speaks of no second person when the rule is off", () => {
    expect(steps(summary([chip("U3")], { twoPersonRule: false }))[0].text).toMatch(/^We checked/);
  });
  it("tells how the drive started, and what nobody tested", () => {
    const startUp = { spins: true, ready: true, reportedSerial: "S1", serialMatches: true, attempts: 2, at: "2026-03-14T09:00:00Z" };
    const of = (more: object | null) => summary([], { drives: [{ letter: "A", chips: [chip("U3")], startUp: more && { ...startUp, ...more } }] });
    expect(steps(of({})).at(-1)).toMatchObject({ day: "Sat 14 Mar", text: "We started the drive with the donor board, after 2 attempts: it spins, gets ready and reports the serial of its label." });
    expect(notStarted(of({}))).toBeNull();
    expect(promiseLimits(of({}))[0]).toContain("will keep starting");
    const other = of({ serialMatches: false, attempts: 1 });
    expect(steps(other).at(-1)!.text).toMatch(/another serial than its label, so we powered it off\. Don’t power it: it reports another drive’s serial\.$/);
    expect(promiseLimits(other)[0]).toContain("start or keep starting");
    expect(notStarted(of(null))).toBe("We have not started the drive with the donor board.");
  });
  it("says of a moved chip that it is gone from the customer's board", () => {
    expect(ownBoardSentence({ chips: [chip("U3")] })).toBe("Its own board was only read, never written to.");
    expect(ownBoardSentence({ chips: [chip("U3", { transferKind: "chip-moved" }), chip("U12")] })).toBe("Nothing was written to its own board; U3 was taken off it and is on the donor board now.");
  });
  it("lists what comes back, packed or sent", () => {
    expect(comesBackSentence(summary([], { comesBack: { items: ["Drive A", "Original board"], at: null } }), day)).toBe("To be packed: Drive A; Original board.");
    expect(comesBackSentence(summary([], { comesBack: { items: ["Drive A"], at: "2026-03-14T09:00:00Z" } }), day)).toBe("Sent or handed over on Sat 14 Mar: Drive A.");
  });
});
