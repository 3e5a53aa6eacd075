import { spawnSync } from "node:child_process";
import { cpSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { CHECK_MUTANTS, CONTROL } from "./mutant-checks";

// Leaves out one check of chain, seals and outside copies at a time, in a copy, and sees whether a test notices:
// `node --import tsx scripts/tamper/mutants.ts`. Writes docs/tamper-mutants.md, which docs/tamper-matrix.md takes in.
const root = path.join(import.meta.dirname, "../..");
const CONFIG = `export default {
  resolve: { alias: [{ find: "server-only", replacement: import.meta.dirname + "/tests/support/empty.ts" }, { find: /^@\\//, replacement: import.meta.dirname + "/" }] },
  test: { environment: "node", include: ["tests/**/*.test.ts"], pool: "forks", fileParallelism: false, testTimeout: 60000 },
};
`;
const CHAIN = ["tests/core/custody.test.ts", "tests/core/honest-logs.test.ts"];
const STORE = ["tests/scripts/check-store.test.ts"];

const home = mkdtempSync(path.join(tmpdir(), "twinread-checks-"));
try {
  for (const part of ["lib", "models", "storage", "scripts", "tests/core", "tests/scripts", "tests/support", "tsconfig.json", "package.json"]) cpSync(path.join(root, part), path.join(home, part), { recursive: true });
  writeFileSync(path.join(home, "vitest.config.ts"), CONFIG);
  symlinkSync(path.join(root, "node_modules"), path.join(home, "node_modules"));
  // the quick test first; the random logs only where it notices nothing
  const passes = (file: string) => (file.startsWith("lib/core") ? CHAIN : STORE).every((test) => spawnSync(process.execPath, ["node_modules/vitest/vitest.mjs", "run", "--bail", "1", test], { cwd: home, stdio: "ignore", timeout: 300_000 }).status === 0);
  const results: { name: string; file: string; noticed: boolean }[] = [];
  for (const mutant of [CONTROL, ...CHECK_MUTANTS]) {
    const target = path.join(home, mutant.file);
    const source = readFileSync(target, "utf8");
    if (!source.includes(mutant.from)) throw new Error(`${mutant.name}: ${mutant.file} no longer holds that text. Bring mutant-checks.ts up to date.`);
    writeFileSync(target, source.replace(mutant.from, () => mutant.to));
    results.push({ name: mutant.name, file: mutant.file, noticed: !passes(mutant.file) });
    writeFileSync(target, source);
    process.stderr.write(`${results[results.length - 1].noticed ? "noticed " : "SURVIVES"} ${mutant.name}\n`);
  }
  const [control, ...rest] = results;
  if (control.noticed) throw new Error("The tests don't pass before anything is left out: make them pass first.");
  const left = rest.filter((one) => !one.noticed);
  const list = (noticed: boolean) => rest.filter((one) => one.noticed === noticed).map(({ name, file }) => `- ${name} (${file})`).join("\n") || "- none";
  writeFileSync(path.join(root, "docs/tamper-mutants.md"), `# Checks left out on purpose

Made by \`node --import tsx scripts/tamper/mutants.ts\`: each check of the chain, of the seals and of copies from outside was left out alone, in a copy, and the tests without a database were run. **${rest.length} left out, ${rest.length - left.length} noticed, ${left.length} not.** A control that changes nothing was not noticed.

Not noticed:

${list(false)}

Noticed:

${list(true)}
`);
} finally {
  rmSync(home, { recursive: true });
}
