import { spawnSync } from "node:child_process";
import { appendFileSync, cpSync, existsSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { CONTROL, RULES, THRESHOLDS_WITHOUT_EFFECT, type Mutant } from "./mutant-rules";

/**
 * Breaks one rule or threshold of the engine at a time, in a copy, and sees whether the tests of tests/core notice.
 * Writes docs/engine-mutants.md. Stops starting new ones after the seconds given (330 unless said). A second argument names
 * a file to go on from: what was noticed is kept there, one name a line, and not run again. Begin it afresh when rules change.
 */
const root = path.join(import.meta.dirname, "../..");
const budget = Number(process.argv[2] ?? 330) * 1000;
const keptIn = process.argv[3] ?? null;
const file = (name: string) => `tests/core/${name}.test.ts`;
/** the quick ones first; real images only where those notice nothing */
const QUICK = ["golden/golden", "thresholds", "family", "inspect", "single-findings", "diagnose-pair", "diagnose-read-back", "judge-set"].map(file);
/** where a change in a file is most likely noticed */
const NEAREST: [RegExp, string[]][] = [
  [/^facts|^inspect/, ["inspect"]], [/^single|^repeat/, ["single-findings"]], [/^judge/, ["judge-set"]], [/read-back/, ["diagnose-read-back"]],
  [/^diagnose/, ["golden/golden", "diagnose-pair"]], [/^thresholds/, ["thresholds", "single-findings", "diagnose-pair"]], [/^family/, ["family"]],
];
const SLOW = ["findings", "engine-properties", "fault-injection"].map(file);

/** "4096", "32_768", "0.98" or "1 / 16" */
function valueOf(text: string): number {
  const [top, bottom = "1"] = text.replaceAll("_", "").split("/");
  return Number(top) / Number(bottom);
}

const scaled = (text: string, by: number) => String(text.includes(".") || text.includes("/") ? Number((valueOf(text) * by).toFixed(6)) : Math.round(valueOf(text) * by));

/** Every threshold doubled, and halved. */
function thresholdMutants(source: string): Mutant[] {
  const found = [...source.matchAll(/export const ([A-Z_0-9]+) = ([0-9._ /]+);/g)];
  return [2, 0.5].flatMap((by) => found.map(([line, name, value]) => ({
    name: `${name} ${by === 2 ? "doubled" : "halved"}`, file: "thresholds.ts", from: line, to: line.replace(`= ${value};`, `= ${scaled(value, by)};`),
    why: THRESHOLDS_WITHOUT_EFFECT[`${name} ${by === 2 ? "doubled" : "halved"}`],
  })));
}

const CONFIG = `export default {
  resolve: { alias: [{ find: /^@\\//, replacement: import.meta.dirname + "/" }] },
  test: { environment: "node", include: ["tests/**/*.test.ts"], pool: "forks", fileParallelism: false, testTimeout: 60000 },
};
`;

const home = mkdtempSync(path.join(tmpdir(), "twinread-mutants-"));
try {
  for (const part of ["lib/core", "lib/engine", "tests/core", "tests/support", "scripts/engine", "tsconfig.json", "package.json"]) {
    cpSync(path.join(root, part), path.join(home, part), { recursive: true });
  }
  // the project's own settings build the worker first, which no rule of the engine needs
  writeFileSync(path.join(home, "vitest.config.ts"), CONFIG);
  symlinkSync(path.join(root, "node_modules"), path.join(home, "node_modules"));
  // a new process for each run: a warm one remembers an earlier failure and calls every change noticed
  const run = (tests: readonly string[]) => spawnSync(process.execPath, ["node_modules/vitest/vitest.mjs", "run", "--bail", "1", "--no-isolate", ...tests], {
    cwd: home, stdio: "ignore", timeout: 300_000,
  }).status === 0;
  const passes = (changed?: string) => {
    const name = changed ? path.basename(changed) : "";
    const nearest = NEAREST.find(([files]) => files.test(name))?.[1].map(file) ?? [];
    if (nearest.length > 0 && !run(nearest)) return false;
    return run(QUICK.filter((test) => !nearest.includes(test))) && run(SLOW);
  };
  if (!passes()) throw new Error("The tests don't pass before anything is broken: make them pass first.");
  const began = Date.now();
  const all = [CONTROL, ...RULES, ...thresholdMutants(readFileSync(path.join(root, "lib/core/thresholds.ts"), "utf8"))];
  const results: { mutant: Mutant; noticed: boolean }[] = [];
  const left: Mutant[] = [];
  const known = new Set(keptIn && existsSync(keptIn) ? readFileSync(keptIn, "utf8").split("\n") : []);
  for (const mutant of all) {
    if (known.has(mutant.name)) {
      results.push({ mutant, noticed: true });
      continue;
    }
    if (Date.now() - began > budget) {
      left.push(mutant);
      continue;
    }
    const target = path.join(home, "lib/core", mutant.file);
    const source = readFileSync(target, "utf8");
    if (!source.includes(mutant.from)) throw new Error(`${mutant.name}: ${mutant.file} no longer holds that text. Bring mutant-rules.ts up to date.`);
    writeFileSync(target, source.replace(mutant.from, () => mutant.to));
    results.push({ mutant, noticed: !passes(target) });
    writeFileSync(target, source);
    if (keptIn && results[results.length - 1].noticed) appendFileSync(keptIn, `${mutant.name}\n`);
    process.stderr.write(`${results[results.length - 1].noticed ? "noticed " : "SURVIVES"} ${mutant.name}\n`);
  }
  const survivors = results.filter((one) => !one.noticed);
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
