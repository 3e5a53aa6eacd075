import { spawnSync } from "node:child_process";
import { readFileSync } from "node:fs";
import { compareImages } from "@/lib/core/compare";
import { comparePairs, judgeReads, verdictOf } from "../inspect/judge";
import { loadReads } from "../inspect/load";

/**
 * What scripts/bench-engine.mjs has measured in a process of its own. `ratio TASK ROUNDS FILE… -- FILE…` times a task,
 * round by round, against sha256sum of the files after the dashes and cmp of the first of those with each other;
 * `time TASK ROUNDS FILE…` times it alone; `memory TASK FILE…` runs it once. Prints one line of JSON.
 */
const asked = (files: string[]) => ({ files, size: null, format: "raw" as const, base: 0, fill: 0xff, json: false });

const TASKS: Record<string, (files: string[]) => void | Promise<void>> = {
  /** the reads in memory and their digests: what every other task begins with */
  load: (files) => void loadReads(asked(files)),
  bytes: (files) => void files.map((file) => readFileSync(file)),
  compare(files) {
    // the bytes themselves, although equal digests would already tell
    const [first, ...others] = files.map((file) => readFileSync(file));
    for (const other of others) compareImages(first, other);
  },
  "digests-and-comparisons"(files) {
    const [first] = loadReads(asked(files));
    for (const file of files.slice(1)) compareImages(first.bytes, readFileSync(file));
  },
  async inspect(files) {
    await judgeReads(loadReads(asked(files)), null);
  },
  async verdict(files) {
    const reads = await judgeReads(loadReads(asked(files)), null);
    verdictOf(reads, comparePairs(reads, null), null);
  },
};

async function timed(work: () => void | Promise<void>): Promise<number> {
  const from = performance.now();
  await work();
  return performance.now() - from;
}

function yardstick(files: string[]): Promise<number> {
  const [first, ...others] = files.map((file) => `'${file}'`);
  // equal files, or cmp would stop at the first difference
  const script = [`sha256sum ${files.map((file) => `'${file}'`).join(" ")}`, ...others.map((other) => `cmp ${first} ${other}`)].join(" && ");
  return timed(() => void spawnSync("sh", ["-c", script], { stdio: "ignore" }));
}

const [mode, name, ...rest] = process.argv.slice(2);
const task = TASKS[name];
const split = rest.indexOf("--");
const yardFiles = split < 0 ? [] : rest.splice(split).slice(1);
const rounds = mode === "memory" ? 1 : Number(rest.shift());
const took: number[] = [];
const yard: number[] = [];
if (mode !== "memory") await task(rest);
for (let round = 0; round < rounds; round += 1) {
  if (mode === "ratio") yard.push(await yardstick(yardFiles));
  took.push(await timed(() => task(rest)));
}
process.stdout.write(`${JSON.stringify({ took, yard, maxRssKib: process.resourceUsage().maxRSS })}\n`);
