import { describe, expect, it } from "vitest";
import { checkWords, gapsOf, keeps, problemWords, WHOLE_LOG } from "@/components/custody/log-words";
import type { CustodyEntryView } from "@/lib/views";

const hash = (n: number) => String(n).repeat(64).slice(0, 64);
const ZERO = "0".repeat(64);

function entry(seq: number, prev = seq === 1 ? ZERO : hash(seq - 1), more: Partial<CustodyEntryView> = {}): CustodyEntryView {
  return {
    seq, at: "2026-03-12T14:20:13.000000Z", actor: { id: "a", name: "Mira Hollis", role: "technician" }, action: "read.stored", sentence: `Stored Read ${seq}`,
    where: "Orig U3", kind: "entry", hash: hash(seq), body: JSON.stringify({ seq, prev }), signature: "c2ln", keyId: ZERO, ...more,
  };
}

describe("gaps in the trace", () => {
  it("draws none while every entry links to the one before", () => {
    expect(gapsOf([entry(1), entry(2), entry(3)]).size).toBe(0);
  });
  it("names one missing entry, and a range of them", () => {
    expect(gapsOf([entry(1), entry(3)]).get(3)).toBe("Entry 2 is missing here.");
    expect(gapsOf([entry(1), entry(5)]).get(5)).toBe("Entries 2 to 4 are missing here.");
  });
  it("shows where an entry no longer carries the hash of the one before", () => {
    expect(gapsOf([entry(1), entry(2, hash(9))]).get(2)).toContain("doesn't link to entry 1");
  });
  it("does not let a body that can't be read pass for a link", () => {
    expect(gapsOf([entry(1), entry(2, undefined, { body: "{" })]).get(2)).toContain("broken here");
  });
  it("notices a beginning that was cut off", () => {
    expect(gapsOf([entry(3)]).get(3)).toBe("Entries 1 to 2 are missing here.");
    expect(gapsOf([entry(1, hash(7))]).get(1)).toContain("beginning is missing");
  });
});

describe("filter", () => {
  it("asks for every word, in any case, anywhere in the entry", () => {
    expect(keeps(entry(2), { ...WHOLE_LOG, words: "mira STORED" })).toBe(true);
    expect(keeps(entry(2), { ...WHOLE_LOG, words: "mira approved" })).toBe(false);
  });
  it("keeps findings and signatures by what was found", () => {
    expect(keeps(entry(2, undefined, { kind: "differs" }), { ...WHOLE_LOG, kind: "findings" })).toBe(true);
    expect(keeps(entry(2), { ...WHOLE_LOG, kind: "signatures" })).toBe(false);
  });
});

describe("words of the check", () => {
  it("counts entries in plain words", () => {
    expect(checkWords({ ok: true, entries: 29, head: { seq: 29, hash: ZERO }, findings: [] }).sentence).toBe("All 29 entries link. Nothing was changed, removed or put in between.");
  });
  it("never calls an empty log linked entries", () => {
    expect(checkWords({ ok: true, entries: 0, head: { seq: 0, hash: ZERO }, findings: [] }).sentence).toBe("This log has no entry yet.");
  });
  it("names the entry and says what happened to it", () => {
    expect(problemWords({ seq: 4, problem: "signature" })).toMatch(/^Entry 4 has a signature that doesn't fit/);
    expect(problemWords({ seq: null, problem: "tail-missing", expected: "7 entries", found: "5" })).toBe("The end of the log is cut off: 7 entries should be there, 5 are.");
  });
  it("shows a problem of a later version rather than nothing", () => {
    expect(problemWords({ seq: 2, problem: "of-tomorrow" })).toContain("of-tomorrow");
  });
});
