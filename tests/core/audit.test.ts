import { execFileSync } from "node:child_process";
import { describe, expect, it } from "vitest";
import { clockOffset, dayStart, readEntry, sessionEnd } from "@/lib/core/audit";
import { type CsvColumn, csvHeader, csvLines } from "@/lib/queries/csv";

const body = (more: object) => JSON.stringify({
  v: 1, drive: "7d4b7a9e-3f0f-4bd0-9c55-1f1d0f5d8a11", seq: 4, at: "2026-11-03T09:14:05.123456Z", app: "1.4.0", actor: { id: "x", name: "Ines Corvo", role: "lead" },
  action: "approval.refused", subject: { type: "chip", id: "x" }, facts: { chip: { id: "7d4b7a9e-3f0f-4bd0-9c55-1f1d0f5d8a11", designator: "U3" }, sha256: "ab".repeat(32), rule: "Read by the same person." }, prev: "0".repeat(64), ...more,
});

describe("an entry as an audit page reads it", () => {
  it("gives rule, chip and digest of an honest one", () => {
    expect(readEntry(body({}), "approval.refused")).toMatchObject({ at: "2026-11-03T09:14:05.123456Z", who: "Ines Corvo", role: "lead", what: "U3", digest: "ab".repeat(32), reason: "Read by the same person.", trouble: null });
  });

  it("never throws and never believes what has another shape", () => {
    const hostile = ["", "null", "[]", "7", '"text"', "{", "{}", '{"actor":null,"facts":null}', '{"action":"constructor","facts":{}}', '{"action":{"x":1}}', body({ facts: [] }), body({ at: "yesterday" }), body({ at: 5 }), body({ actor: [] }), "\ud800"];
    for (const text of hostile) {
      const read = readEntry(text, "approval.refused");
      expect(read.trouble, text).not.toBeNull();
      for (const value of [read.at, read.who, read.role, read.sentence, read.what, read.digest, read.to, read.reason]) expect(typeof value, text).toBe("string");
    }
  });

  it("says so where the row beside the body names another action", () => {
    expect(readEntry(body({}), "image.handed-out").trouble).toContain("The row beside it says image.handed-out");
  });

  it("reads how far the clock or the head had been turned back, and takes no other value for it", () => {
    const with_ = (more: object) => readEntry(body({ facts: { chip: { id: "7d4b7a9e-3f0f-4bd0-9c55-1f1d0f5d8a11", designator: "U3" }, sha256: "ab".repeat(32), rule: "r", ...more } }), "approval.refused");
    expect(with_({ clockBehindMs: 1500, headBehind: 3 })).toMatchObject({ clockBehindMs: 1500, headBehind: 3, trouble: null });
    expect(with_({ clockBehindMs: "1500" })).toMatchObject({ clockBehindMs: null });
  });
});

describe("the end of a session", () => {
  const at = (seconds: number) => new Date(1_790_000_000_000 + seconds * 1000);
  const end = (lastSeen: number, ended: number | null, now: number) => sessionEnd({ createdAt: at(0), lastSeenAt: at(lastSeen), endedAt: ended === null ? null : at(ended) }, at(now), 1800, 28_800);
  it("tells open, idle, too long and ended by hand apart", () => {
    expect(end(10, null, 60)).toBe("open");
    expect(end(10, null, 1810)).toBe("open");
    expect(end(10, null, 1811)).toBe("idle");
    expect(end(28_000, null, 28_801)).toBe("whole");
    expect(end(10, 60, 99_999)).toBe("ended");
    expect(end(10, 5000, 99_999)).toBe("idle");
  });
});

describe("the offset of two clocks", () => {
  it("takes the way there and back off and trusts the quickest try", () => {
    expect(clockOffset([{ sent: 1000, said: 1600, got: 1200 }, { sent: 2000, said: 2505, got: 2010 }])).toEqual({ offsetMs: 500, withinMs: 5 });
    expect(clockOffset([])).toBeNull();
  });
});

describe("the first instant of a day", () => {
  it("follows the zone, also over a change of its offset", () => {
    expect(dayStart("2026-03-12", "UTC")).toBe("2026-03-12T00:00:00.000000Z");
    expect(dayStart("2026-03-12", "UTC", 1)).toBe("2026-03-13T00:00:00.000000Z");
    expect(dayStart("2026-07-01", "Europe/London")).toBe("2026-06-30T23:00:00.000000Z");
    // the clocks go forward on 29 March 2026 at 01:00 and back on 25 October
    expect(dayStart("2026-03-29", "Europe/London", 1)).toBe("2026-03-29T23:00:00.000000Z");
    expect(dayStart("2026-10-25", "Europe/London")).toBe("2026-10-24T23:00:00.000000Z");
    expect(dayStart("2026-10-25", "Europe/London", 1)).toBe("2026-10-26T00:00:00.000000Z");
    expect(dayStart("2026-01-01", "Pacific/Auckland")).toBe("2025-12-31T11:00:00.000000Z");
  });
});

describe("CSV", () => {
  const columns: CsvColumn<{ text: string; n: number; no: boolean; none: null }>[] = [
    { header: "=head", cell: (row) => row.text }, { header: "n", cell: (row) => row.n }, { header: "yes", cell: (row) => row.no }, { header: "none", cell: (row) => row.none },
  ];
  const cells = ["plain", "", "=1+1", "+1", "-1", "@x", "\tx", "\rx", "\nx", "\0x", "＝1", "a,b", 'a"b', "a\rb", "a\nb", "a\r\nb", "ends\r", "'kept", " =1", "漢字 😀 é", ",", '"', ",,\"\r\n"];
  it("is read back by another program as it was, but for the apostrophe before what a spreadsheet would run", () => {
    const text = csvHeader(columns) + csvLines(columns, cells.map((cell) => ({ text: cell, n: -5, no: false, none: null })));
    const script = "import csv,io,json,sys\nprint(json.dumps(list(csv.reader(io.StringIO(sys.stdin.buffer.read().decode('utf-8'),newline=''),strict=True))))";
    const rows = JSON.parse(execFileSync("python3", ["-c", script], { input: text }).toString()) as string[][];
    expect(rows[0]).toEqual(["'=head", "n", "yes", "none"]);
    expect(rows.slice(1).map((row) => row[0])).toEqual(cells.map((cell) => (/^[=+\-@\t\r\n\0＝]/.test(cell) ? `'${cell}` : cell)));
    expect(rows.slice(1).every((row) => row[1] === "-5" && row[2] === "no" && row[3] === "")).toBe(true);
  });
  it("ends each line in CRLF, also the last, and gives nothing for no row", () => {
    expect(csvLines(columns, [{ text: "a", n: 1, no: true, none: null }])).toBe("a,1,yes,\r\n");
    expect(csvLines(columns, [])).toBe("");
  });
});
