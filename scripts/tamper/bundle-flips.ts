import { execFile } from "node:child_process";
import { writeFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { promisify } from "node:util";
import { randomOf } from "@/scripts/engine/random";
import { makeBag } from "@/tests/support/make-bag";
import { zipBag } from "@/tests/support/zip-bag";
import { flipsPage } from "./flips-page";
import { flipArchive, flipFiles, flipForScript, type Tally, type ZipFlip } from "./flips";
import { zipParts } from "./zip-map";

// Every byte of a small bundle flipped, one at a time: `node --import tsx scripts/tamper/bundle-flips.ts [SEED]`.
// Writes docs/bundle-flips.md. Takes some ten minutes; its parts run beside each other, each a process of its own.
const run = promisify(execFile);
const [seed = "1", part = ""] = process.argv.slice(2);

/** Files of which check.sh is run on every byte; of the others on a sample. */
const WHOLE = /^(bagit\.txt|bag-info\.txt|tagmanifest-sha256\.(txt|sig)|data\/seal\/seal\.(txt|sig))$/;
const SAMPLE = 12;
/** `unzip -t` is run on every byte of the archive's own fields, and of the content on one of so many. */
const UNZIP_CONTENT = 16;
const SHARES = 3;

const all = (length: number) => Array.from({ length }, (_, i) => i);
const bag = makeBag({ drives: 1, imageBytes: 64 });
const zip = await zipBag(bag);
const parts = zipParts(zip);

const files = async (): Promise<[string, Tally][]> => [...(await flipFiles(bag, (_, length) => all(length)))];

function archive(share: number): Promise<ZipFlip[]> {
  const content = new Set(parts.filter(({ name }) => name === "content").flatMap(({ start, length }) => all(length).map((i) => start + i)));
  return flipArchive(zip, all(zip.length).filter((at) => at % SHARES === share), (at) => !content.has(at) || at % UNZIP_CONTENT === 0);
}

async function script(): Promise<[string, Tally][]> {
  const random = randomOf(Number(seed));
  const flips = [...bag].filter(([name]) => name !== "check.sh").flatMap(([name, { length }]) =>
    (WHOLE.test(name) ? all(length) : Array.from({ length: SAMPLE }, () => random.below(length))).map((at) => ({ name, at })));
  return [...(await flipForScript(bag, flips, 3))];
}

async function inProcess<T>(name: string): Promise<T> {
  const { stdout } = await run(process.execPath, ["--import", "tsx", fileURLToPath(import.meta.url), seed, name], { maxBuffer: 256 * 1024 * 1024 });
  process.stderr.write(`Done: ${name}\n`);
  return JSON.parse(stdout) as T;
}

async function whole(): Promise<void> {
  const [byPage, byScript, ...shares] = await Promise.all([
    inProcess<[string, Tally][]>("files"), inProcess<[string, Tally][]>("script"), ...all(SHARES).map((share) => inProcess<ZipFlip[]>(`archive ${share}`)),
  ]);
  const flips = shares.flat().sort((a, b) => a.at - b.at);
  const page = flipsPage({ seed, bag, zip, parts, byPage: new Map(byPage), byScript: new Map(byScript), flips, sample: SAMPLE, unzipContent: UNZIP_CONTENT });
  writeFileSync("docs/bundle-flips.md", page);
  const missed = [...byPage, ...byScript].filter(([, tally]) => tally.missed.length > 0);
  process.exitCode = missed.length > 0 ? 1 : 0;
}

if (part === "") await whole();
else process.stdout.write(JSON.stringify(part === "files" ? await files() : part === "script" ? await script() : await archive(Number(part.split(" ")[1]))));
