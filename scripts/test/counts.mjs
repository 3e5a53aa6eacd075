import { readFileSync, rmSync } from "node:fs";

/** A check such as the type check counts as one test. */
export const oneCheck = (exitCode) => ({ passed: exitCode === 0 ? 1 : 0, failed: exitCode === 0 ? 0 : 1 });

export function vitestCounts(file, exitCode) {
  return counted(file, exitCode, (report) => {
    // a file that could not even be loaded has no test of its own to fail
    const unloaded = report.testResults.filter((result) => result.status === "failed" && result.assertionResults.every((test) => test.status !== "failed"));
    return { passed: report.numPassedTests, failed: report.numFailedTests + unloaded.length };
  });
}

export function playwrightCounts(file, exitCode) {
  return counted(file, exitCode, ({ stats, errors }) => ({ passed: stats.expected, failed: stats.unexpected + stats.flaky + (errors?.length ?? 0) }));
}

/** A run that ended badly never counts as all passed, whatever its report says. */
function counted(file, exitCode, read) {
  let counts = { passed: 0, failed: 0 };
  try {
    counts = read(JSON.parse(readFileSync(file, "utf8")));
  } catch (error) {
    process.stderr.write(`The report of a test run could not be read (${error.message}).\n`);
    counts = { passed: 0, failed: 1 };
  }
  rmSync(file, { force: true });
  return exitCode !== 0 && counts.failed === 0 ? { ...counts, failed: 1 } : counts;
}

export const sum = (all) => all.reduce((a, b) => ({ passed: a.passed + b.passed, failed: a.failed + b.failed }), { passed: 0, failed: 0 });
