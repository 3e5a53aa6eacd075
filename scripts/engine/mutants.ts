import { spawnSync } from "node:child_process";
import { cpSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { RULES, type Mutant } from "./mutant-rules";

/**
 * Breaks one rule or threshold of the engine at a time, in a copy, and sees whether the tests of tests/core notice.
 * Writes docs/engine-mutants.md. Stops starting new ones after the seconds given (330 unless said).
 */
const root = path.join(import.meta.dirname, "../..");
const budget = Number(process.argv[2] ?? 330) * 1000;
const TESTS = ["golden/golden", "inspect", "single-findings", "diagnose-pair", "diagnose-read-back", "judge-set", "findings", "fault-injection"].map((name) => `tests/core/${name}.test.ts`);

const scaled = (text: string, by: number) => String(text.includes(".") || text.includes("/") ? Number((valueOf(text) * by).toFixed(6)) : Math.round(valueOf(text) * by));

/** "4096", "32_768", "0.98" or "1 / 16" */
function valueOf(text: string): number {
  const [top, bottom = "1"] = text.replaceAll("_", "").split("/");
  return Number(top) / Number(bottom);
}

/** Every threshold doubled, and halved. */
function thresholdMutants(source: string): Mutant[] {
  const found = [...source.matchAll(/export const ([A-Z_0-9]+) = ([0-9._ /]+);/g)];
  return [2, 0.5].flatMap((by) => found.map(([line, name, value]) => ({
    name: `${name} ${by === 2 ? "doubled" : "halved"}`, file: "thresholds.ts", from: line, to: line.replace(`= ${value};`, `= ${scaled(value, by)};`),
  })));
}

const home = mkdtempSync(path.join(tmpdir(), "twinread-mutants-"));
try {
  for (const part of ["lib/core", "tests/core", "tests/support", "scripts/engine", "vitest.config.ts", "tsconfig.json", "package.json"]) {
    cpSync(path.join(root, part), path.join(home, part), { recursive: true });
  }
  symlinkSync(path.join(root, "node_modules"), path.join(home, "node_modules"));
  const passes = () => spawnSync("npx", ["vitest", "run", "--bail", "1", "--pool", "threads", "--no-isolate", ...TESTS], { cwd: home, stdio: "ignore", timeout: 60_000 }).status === 0;
  if (!passes()) throw new Error("The tests don't pass before anything is broken: make them pass first.");
  const began = Date.now();
  const all = [...RULES, ...thresholdMutants(readFileSync(path.join(root, "lib/core/thresholds.ts"), "utf8"))];
  const results: { mutant: Mutant; noticed: boolean }[] = [];
  for (const mutant of all) {
    if (Date.now() - began > budget) break;
    const file = path.join(home, "lib/core", mutant.file);
    const source = readFileSync(file, "utf8");
    if (!source.includes(mutant.from)) throw new Error(`${mutant.name}: ${mutant.file} no longer holds that text. Bring mutant-rules.ts up to date.`);
    writeFileSync(file, source.replace(mutant.from, () => mutant.to));
    results.push({ mutant, noticed: !passes() });
    writeFileSync(file, source);
    process.stderr.write(`${results[results.length - 1].noticed ? "noticed " : "SURVIVES"} ${mutant.name}\n`);
  }
  const survivors = results.filter((one) => !one.noticed);
  const left = all.slice(results.length);
  writeFileSync(path.join(root, "docs/engine-mutants.md"), `# Rules broken on purpose

Made by \`node --import tsx scripts/engine/mutants.ts\`: each line of the engine below was changed alone, in a copy, and the engine's tests in tests/core were run. ${results.length} changes, ${results.length - survivors.length} noticed, ${survivors.length} not.${left.length > 0 ? ` Not run for want of time: ${left.length}.` : ""}

## Not noticed

${survivors.map(({ mutant }) => `- ${mutant.name} (${mutant.file})${mutant.why ? `: ${mutant.why}` : ""}`).join("\n") || "None."}

## Noticed

${results.filter((one) => one.noticed).map(({ mutant }) => `- ${mutant.name} (${mutant.file})`).join("\n")}
${left.length > 0 ? `\n## Not run\n\n${left.map((mutant) => `- ${mutant.name}`).join("\n")}\n` : ""}`);
  process.stdout.write(`${results.length} changes, ${survivors.length} not noticed, ${left.length} not run\n`);
} finally {
  rmSync(home, { recursive: true });
}
