import { describe, expect, it } from "vitest";
import { benchGroups, dateSentence, dueWords, lateWords, rowAction } from "@/components/bench/bench-words";
import { placeChips, SLOTS, spotAt } from "@/components/case/board-place";
import { readsWords, waitsFor } from "@/components/case/case-words";
import { type ChipStateCode, DEFAULT_POLICY } from "@/lib/core/words";
import type { BenchRow, BoardView, ChipSummary, DriveView } from "@/lib/views";

function chip(id: string, state: ChipStateCode, more: Partial<ChipSummary> = {}): ChipSummary {
  return {
    id, designator: id.toUpperCase(), boardRole: "original", bus: "spi", sizeBytes: 8192, sizeSource: "typed", supplyMillivolts: 3300, package: null, marking: null, holds: null, idBytes: null, sfdp: null,
    needsTransfer: true, place: null, state: { state, label: state, sentence: "" }, pair: null, countedReads: 0, agreeingReads: 0, donorSaved: false, composite: null, thumbnail: { images: [], lane: null, shows: "reads" }, ...more,
  };
}
const board = (role: "original" | "donor", chips: ChipSummary[]): BoardView => ({ id: role, role, boardNumber: "BX 40-3179", revision: null, controllerMarking: null, motorDriverMarking: null, condition: null, dataInController: false, fit: null, chips });
const drive = (...boards: BoardView[]): DriveView => ({ id: "d", caseId: "c", letter: "A", partNumber: "PN 1", model: null, serial: null, interface: null, capacity: null, made: null, firmware: null, encryption: null, warnings: [], boards, custodyEntries: 0 });
const row = (state: ChipStateCode, more: Partial<BenchRow> = {}): BenchRow => ({ chip: chip("u3", state), caseId: "c", caseRef: "26-0183", customerName: "", partNumber: "", dueOn: null, late: null, lateDays: 0, next: "", nextWhy: null, with: "", mine: false, hold: null, ...more });

describe("the bench", () => {
  it("keeps empty groups on the route and counts the late ones in theirs", () => {
    const groups = benchGroups([row("unread"), row("needs-reads", { late: "late" }), row("failed")]);
    expect(groups.map((g) => [g.key, g.rows.length, g.late])).toContainEqual(["to-read", 2, 1]);
    expect(groups.find((g) => g.key === "verified")?.rows).toEqual([]);
    expect(groups.filter((g) => g.detour).map((g) => g.key)).toEqual(["reads-disagree", "held", "failed"]);
  });
  it("says what is late, due and mine in words", () => {
    const rows = [row("unread", { late: "late" }), row("ready", { late: "late", mine: true }), row("ready", { late: "today" })];
    expect(lateWords(rows)).toBe("Two are late");
    expect(dueWords(rows)).toBe("one is due today. One is with you.");
    expect(lateWords([])).toBeNull();
  });
  it("tells the workshop's day, not the browser's", () => {
    expect(dateSentence("2026-03-12T23:32:00Z", "Europe/Berlin")).toBe("Friday 13 March 2026, 00:32");
  });
  it("does not send who may not act to a form", () => {
    expect(rowAction(row("approved"), false)).toEqual({ word: "Open", href: "/chips/u3" });
    expect(rowAction(row("approved"), true).href).toBe("/chips/u3#transfer");
  });
});

describe("a case", () => {
  it("keeps the summary closed while one chip that needs transfer is unverified", () => {
    expect(waitsFor([drive(board("original", [chip("u3", "verified"), chip("u12", "written")]))])).toBe("opens when U12 is verified");
    expect(waitsFor([drive(board("original", [chip("u3", "verified"), chip("u9", "unread", { needsTransfer: false })]))])).toBeNull();
    expect(waitsFor([])).toContain("recorded");
  });
  it("does not say that too few reads agree", () => {
    expect(readsWords({ countedReads: 2, agreeingReads: 2, composite: null }, DEFAULT_POLICY)).toBe("2 of 3 agree");
    expect(readsWords({ countedReads: 3, agreeingReads: 3, composite: null }, DEFAULT_POLICY)).toBe("3 agree");
    expect(readsWords({ countedReads: 4, agreeingReads: 3, composite: null }, DEFAULT_POLICY)).toBe("3 of 4 agree");
    expect(readsWords({ countedReads: 1, agreeingReads: 1, composite: { number: 6, reads: 5, seatings: 2 } }, DEFAULT_POLICY)).toBe("composite of 5 reads");
  });
  it("draws a donor's chip where its pair is, and never two in one place", () => {
    const original = board("original", [chip("u3", "unread"), chip("u12", "unread")]);
    const donor = board("donor", [chip("x1", "unread", { boardRole: "donor" }), chip("d12", "unread", { boardRole: "donor", pair: { id: "u12", designator: "U12", boardId: "original", boardNumber: "", sizeBytes: 8192 } })]);
    const spots = placeChips(original, donor);
    expect(spots.get("d12")).toEqual(spots.get("u12"));
    expect(spots.get("x1")).not.toEqual(spots.get("d12"));
  });
  it("draws a chip where it was placed, wholly on the board, and its pair there too", () => {
    const original = board("original", [chip("u3", "unread"), chip("u12", "unread", { place: { x: 1000, y: 0 } })]);
    const donor = board("donor", [chip("d12", "unread", { boardRole: "donor", pair: { id: "u12", designator: "U12", boardId: "original", boardNumber: "", sizeBytes: 8192 } })]);
    const spots = placeChips(original, donor);
    expect(spots.get("u12")).toEqual({ x: 506, y: 16, width: 44, height: 25 });
    expect(spots.get("d12")).toEqual(spots.get("u12"));
    expect(spotAt({ x: 500, y: 500 })).toEqual({ x: 258, y: 113, width: 44, height: 25 });
  });
  it("gives a slot that a placed chip covers to nobody", () => {
    const [first] = SLOTS;
    const at = { x: Math.round(((first.x + 22) / 560) * 1000), y: Math.round(((first.y + 12) / 250) * 1000) };
    const spots = placeChips(board("original", [chip("u1", "unread", { place: at }), chip("u2", "unread")]), null);
    expect(spots.get("u2")).toEqual(SLOTS[1]);
    expect(placeChips(board("original", [chip("u1", "unread", { place: { x: 500, y: 500 } }), chip("u2", "unread")]), null).get("u2")).toEqual(SLOTS[1]);
  });
});
