import { describe, expect, it } from "vitest";
import { agoText, auditVerdict, clockSentence, lengthText, overviewLines, sealsSentence } from "@/components/audit/audit-words";
import { filterOf, filterQuery, groupOf, keeps, WHOLE_LOG } from "@/components/custody/log-words";
import type { AuditOverview, AuditSealRow, WaitingLog } from "@/lib/core/audit-rows";
import { ACTIONS } from "@/lib/core/custody-actions";
import type { CustodyEntryView } from "@/lib/views";

const NOW = "2026-11-04T12:00:00.000Z";
const seal = (more: Partial<AuditSealRow> = {}): AuditSealRow => ({
  number: 41, at: "2026-11-04T02:00:00.000000Z", cause: "daily", chains: 12, root: "ab".repeat(32), prev: "cd".repeat(32), sha256: "ef".repeat(32), keyId: "01".repeat(32), faults: [], mailed: { sent: 1, waiting: 0, givenUp: 0 }, ...more,
});
const none = { at: "", sentence: "", total: 0 };
const images = { total: 30, damaged: 0, missing: 0, oldest: "2026-11-01T11:00:00.000Z", neverChecked: 0, keeping: "keeping-up", keepingSentence: "", days: 7, mebibytesPerSecond: 20, hours: 1 } as const;
const clean = (more: Partial<AuditOverview> = {}): AuditOverview => ({
  now: NOW, logs: { total: 12, clean: 12, findings: 0, unchecked: 0, oldestCheck: "2026-11-04T02:10:00.000Z" }, waiting: [], images,
  seals: { total: 41, newest: seal(), today: true, faulty: [] }, clock: { offsetMs: 0.4, withinMs: 1 }, handOuts: none, refusals: none, assessments: none, clockEntries: none, limits: none, openSessions: 1, ...more,
});
const waiting: WaitingLog = { chainId: "x", workshop: false, driveId: "x", letter: "B", caseId: "y", caseRef: "26-0042", checkedAt: NOW, findings: [], count: 1 };

describe("the verdict", () => {
  it("says in one sentence that logs, images and seal are in order", () => {
    expect(auditVerdict(clean())).toMatchObject({ mark: "ok", sentence: "All 12 logs check out; the oldest look at a stored image was 3 days ago; seal 41 of today is mailed." });
  });
  it("names what is wrong before anything else, and where", () => {
    const found = auditVerdict(clean({ logs: { total: 12, clean: 11, findings: 1, unchecked: 0, oldestCheck: NOW }, waiting: [waiting], images: { ...images, damaged: 2 } }));
    expect(found).toMatchObject({ mark: "block", sentence: "1 of 12 logs doesn't check out. Drive B of case 26-0042 waits for an assessment." });
    expect(found.why).toContain("under Logs, Stored images and Assessments");
  });
  it("does not call a log clean that nobody checked, or that was checked long ago", () => {
    expect(auditVerdict(clean({ logs: { total: 12, clean: 0, findings: 0, unchecked: 12, oldestCheck: null } })).mark).toBe("wait");
    expect(auditVerdict(clean({ logs: { total: 12, clean: 11, findings: 0, unchecked: 1, oldestCheck: null } }))).toMatchObject({ mark: "caution", sentence: "11 of 12 logs check out, 1 was never checked." });
    expect(auditVerdict(clean({ logs: { total: 12, clean: 12, findings: 0, unchecked: 0, oldestCheck: "2026-10-30T02:10:00.000Z" } }))).toMatchObject({ mark: "caution", sentence: expect.stringContaining("last checked 5 days ago") as string });
  });
  it("does not call an assessed log clean either", () => {
    expect(auditVerdict(clean({ logs: { total: 12, clean: 11, findings: 1, unchecked: 0, oldestCheck: NOW } })).mark).toBe("caution");
  });
  it("says nothing of sign-ins to whom they are not shown", () => {
    expect(overviewLines(clean({ limits: null, openSessions: null })).map((line) => line.key)).not.toContain("sign-ins");
  });
  it("says when images are no longer read again as they should be", () => {
    expect(auditVerdict(clean({ images: { ...images, keeping: "stopped", keepingSentence: "Reading stored images again waits: the disk is away." } }))).toMatchObject({ mark: "caution", sentence: "Reading stored images again waits: the disk is away." });
  });
  it("marks a clock that is off", () => {
    expect(auditVerdict(clean({ clock: { offsetMs: -4000, withinMs: 3 } }))).toMatchObject({ mark: "caution", sentence: expect.stringContaining("4.000 s behind the app's") as string });
  });
});

describe("the chain of seals", () => {
  it("names a fault before mail and day", () => {
    expect(sealsSentence({ total: 41, newest: seal(), today: true, faulty: [7, 9] })).toMatchObject({ mark: "block", sentence: expect.stringContaining("seals 7 and 9") as string });
  });
  it("says when a mail was given up, and when today has no seal", () => {
    expect(sealsSentence({ total: 2, newest: seal({ mailed: { sent: 1, waiting: 0, givenUp: 1 } }), today: true, faulty: [] })).toMatchObject({ mark: "caution", sentence: expect.stringContaining("could not be mailed to everybody") as string });
    expect(sealsSentence({ total: 2, newest: seal(), today: false, faulty: [] })).toMatchObject({ mark: "caution", sentence: expect.stringContaining("today has none yet") as string });
    expect(sealsSentence({ total: 0, newest: null, today: false, faulty: [] }).mark).toBe("wait");
  });
});

it("writes lengths and ages as people say them", () => {
  expect([12.4, 999, 1000, 1234.9, 65_000, 125_000, 3_725_400].map(lengthText)).toEqual(["12 ms", "999 ms", "1.000 s", "1.234 s", "65.000 s", "2 min 5 s", "1 h 2 min 5 s"]);
  expect(["2026-11-04T11:59:40.000Z", "2026-11-04T11:59:00.000Z", "2026-11-04T09:30:00.000Z", "2026-11-02T11:00:00.000Z"].map((at) => agoText(at, NOW))).toEqual(["just now", "1 minute ago", "2 hours ago", "2 days ago"]);
  expect(clockSentence({ offsetMs: 0.4, withinMs: 1 })).toBe("The clocks of app and database agree.");
});

describe("the filter of a log", () => {
  const entry = (action: string): CustodyEntryView => ({ seq: 1, at: NOW, actor: { id: "a", name: "Mira Hollis", role: "technician" }, action, sentence: "", where: "Orig U3", kind: "entry", hash: "", body: "{}", signature: "", keyId: "" });
  it("has a group for every step that a log can hold", () => {
    expect(Object.keys(ACTIONS).filter((action) => groupOf(action) === "other")).toEqual([]);
    expect(groupOf("something.new")).toBe("other");
    expect(groupOf("image.handed-out")).toBe("outside");
    expect(groupOf("images.checked")).toBe("images");
  });
  it("goes into the address and comes back, and leaves nonsense out", () => {
    const filter = { kind: "findings", group: "reads", who: "Mira & Co", where: "Orig U3", words: "é #1" } as const;
    expect(filterOf(new URLSearchParams(filterQuery(filter)))).toEqual(filter);
    expect(filterQuery(WHOLE_LOG)).toBe("");
    expect(filterOf(new URLSearchParams("kind=everything&other=1"))).toEqual(WHOLE_LOG);
  });
  it("shows one group only", () => {
    expect(keeps(entry("read.stored"), { ...WHOLE_LOG, group: "reads" })).toBe(true);
    expect(keeps(entry("approval.given"), { ...WHOLE_LOG, group: "reads" })).toBe(false);
  });
});
