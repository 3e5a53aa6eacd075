import { execFile } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { promisify } from "node:util";
import { type Bag, FOLDER } from "@/tests/support/make-bag";
import { rememberingTools, verifyBag, verifyZip, writeBag } from "@/tests/support/verify-bag";

const run = promisify(execFile);

/** One bit, another one at each place, so that all eight come up. */
export function flipped(bytes: Buffer, at: number): Buffer {
  const other = Buffer.from(bytes);
  other[at] ^= 1 << (at % 8);
  return other;
}

export interface Tally {
  flips: number;
  found: number;
  /** the first thing that is named is the changed file, or what speaks of it */
  namedFirst: number;
  missed: number[];
}

const emptyTally = (): Tally => ({ flips: 0, found: 0, namedFirst: 0, missed: [] });

/** The page's check on every byte of every file, or on the places given. */
export async function flipFiles(bag: Bag, places: (name: string, length: number) => Iterable<number>): Promise<Map<string, Tally>> {
  const tools = rememberingTools();
  const tallies = new Map<string, Tally>();
  for (const [name, bytes] of bag) {
    const tally = emptyTally();
    tallies.set(name, tally);
    for (const at of places(name, bytes.length)) {
      const report = await verifyBag(new Map(bag).set(name, flipped(bytes, at)), null, tools);
      tally.flips += 1;
      if (report.verdict === "not-in-order") tally.found += 1;
      else tally.missed.push(at);
      if (report.steps.find((step) => step.faults.length > 0)?.faults[0].place.startsWith(name)) tally.namedFirst += 1;
    }
  }
  return tallies;
}

async function exitOf(program: string, args: string[]): Promise<number> {
  return run(program, args).then(() => 0, (error: { code?: unknown }) => (typeof error.code === "number" ? error.code : -1));
}

/** check.sh on the same flips, `workers` folders at a time. */
export async function flipForScript(bag: Bag, flips: { name: string; at: number }[], workers: number): Promise<Map<string, Tally>> {
  const tallies = new Map<string, Tally>();
  const queue = [...flips];
  const work = mkdtempSync(path.join(os.tmpdir(), "twinread-flips-"));
  async function worker(number: number): Promise<void> {
    const folder = path.join(work, String(number));
    writeBag(bag, folder);
    for (let flip = queue.shift(); flip; flip = queue.shift()) {
      const { name, at } = flip;
      const tally = tallies.get(name) ?? emptyTally();
      tallies.set(name, tally);
      writeFileSync(path.join(folder, name), flipped(bag.get(name)!, at));
      const code = await exitOf("sh", [path.join(folder, "check.sh")]);
      writeFileSync(path.join(folder, name), bag.get(name)!);
      tally.flips += 1;
      if (code === 1) tally.found += 1;
      else tally.missed.push(at);
    }
  }
  await Promise.all(Array.from({ length: workers }, (_, i) => worker(i)));
  rmSync(work, { recursive: true });
  return tallies;
}

export interface ZipFlip {
  at: number;
  page: boolean;
  /** null where it was not asked */
  unzip: boolean | null;
}

/** The page's check on the archive with single bytes flipped, and `unzip -t` beside it. */
export async function flipArchive(zip: Buffer, places: Iterable<number>, withUnzip: (at: number) => boolean): Promise<ZipFlip[]> {
  const tools = rememberingTools();
  const file = path.join(mkdtempSync(path.join(os.tmpdir(), "twinread-zip-")), `${FOLDER}.zip`);
  const flips: ZipFlip[] = [];
  for (const at of places) {
    const other = flipped(zip, at);
    const report = await verifyZip(other, tools);
    let unzip: boolean | null = null;
    if (withUnzip(at)) {
      writeFileSync(file, other);
      unzip = (await exitOf("unzip", ["-tqq", file])) !== 0;
    }
    flips.push({ at, page: report.verdict === "not-in-order", unzip });
  }
  rmSync(path.dirname(file), { recursive: true });
  return flips;
}
