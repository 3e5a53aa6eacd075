import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { oneCheck, playwrightCounts, sum, vitestCounts } from "@/scripts/test/counts.mjs";

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), "twinread-counts-"));
});
afterEach(() => rmSync(folder, { recursive: true }));

function report(content: object): string {
  const file = path.join(folder, "report.json");
  writeFileSync(file, JSON.stringify(content));
  return file;
}

describe("the summed line", () => {
  it("counts a file that could not be loaded", () => {
    const file = report({ numPassedTests: 4, numFailedTests: 1, testResults: [
      { status: "failed", assertionResults: [{ status: "failed" }] }, { status: "failed", assertionResults: [] }, { status: "passed", assertionResults: [] },
    ] });
    expect(vitestCounts(file, 1)).toEqual({ passed: 4, failed: 2 });
  });

  it("never calls a run that ended badly all passed", () => {
    expect(vitestCounts(report({ numPassedTests: 4, numFailedTests: 0, testResults: [] }), 1)).toEqual({ passed: 4, failed: 1 });
    expect(vitestCounts(path.join(folder, "missing.json"), 0)).toEqual({ passed: 0, failed: 1 });
  });

  it("adds checks and browser tests", () => {
    const browser = playwrightCounts(report({ stats: { expected: 7, unexpected: 1, flaky: 1, skipped: 0 }, errors: [] }), 1);
    expect(sum([oneCheck(0), oneCheck(2), browser])).toEqual({ passed: 8, failed: 3 });
  });
});
