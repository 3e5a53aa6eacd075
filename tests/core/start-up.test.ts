import { describe, expect, it } from "vitest";
import { afterPowerOn, mayBecome, serialMatches, startUpRefusal, startUpWords } from "@/lib/core/start-up";

describe("the serial that a drive reports", () => {
  it.each([
    ["WX41 A-77/203", "wx41a77203", true], ["WX41A77203", " WX41-A77.203 ", true], ["ＷＸ41", "wx41", true], ["WX41A77203", "WX41A77204", false],
    // a look-alike is another serial: the label is looked at, not guessed
    ["WXO1", "WX01", false],
    [null, "WX41", null], ["WX41", null, null], ["WX41", " - ", null], [null, null, null],
  ])("label %j, reported %j: %j", (label, reported, matches) => {
    expect(serialMatches(label, reported)).toBe(matches);
  });

  it("stops nobody over a serial that is half typed, and does at the first wrong character", () => {
    for (const typed of ["", "q", "QF-22", "qf 2207 51"]) expect(mayBecome("QF-2207-51", typed), typed).toBe(true);
    for (const typed of ["R", "QF-23", "QF-2207-511"]) expect(mayBecome("QF-2207-51", typed), typed).toBe(false);
  });
});

describe("starting a drive", () => {
  const chip = (state: "verified" | "written" | "failed" | "approved", transferKind: "write" | "chip-moved" | null = "write", designator = "U12") => ({ designator, state, label: state, transferKind });

  it("waits until every chip is verified, or was moved itself", () => {
    expect(startUpRefusal([chip("verified"), chip("verified", "chip-moved", "U3")])).toBeNull();
    expect(startUpRefusal([chip("written", "chip-moved")])).toBeNull();
    expect(startUpRefusal([])).toContain("Record the chip first");
    expect(startUpRefusal([chip("verified"), chip("written", "write", "U3")])).toBe("U3 (written) is not verified yet. Finish it first: a drive is started only with what was read back and found equal.");
    expect(startUpRefusal([chip("failed", "chip-moved"), chip("approved", null, "U3")])).toContain("U12 (failed) and U3 (approved) are not verified");
  });

  it.each([
    ["before any test", { takenAt: null, storedAt: 50 }, [], false],
    ["after the test", { takenAt: null, storedAt: 50 }, [40], true],
    ["stored after, taken before the test", { takenAt: 30, storedAt: 50 }, [40], false],
    ["a claimed time after its storing", { takenAt: 60, storedAt: 35 }, [40], false],
    ["a test before this transfer", { takenAt: null, storedAt: 50 }, [5], false],
    ["a later test counts too", { takenAt: 45, storedAt: 50 }, [5, 40, 70], true],
  ])("a read-back %s", (_, read, tests, after) => {
    expect(afterPowerOn(read, 10, tests)).toBe(after);
  });

  it("says in words what the drive did", () => {
    expect(startUpWords({ spins: true, ready: true, reportedSerial: "A", serialMatches: true, attempts: 1 })).toBe("spins, gets ready and reports the serial of its label; 1 attempt");
    expect(startUpWords({ spins: true, ready: false, reportedSerial: null, serialMatches: null, attempts: 3 })).toBe("spins and does not get ready; 3 attempts");
  });
});
