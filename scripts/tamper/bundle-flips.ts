import { writeFileSync } from "node:fs";
import { withCommas } from "@/lib/core/quantity";
import { randomOf } from "@/scripts/engine/random";
import { makeBag } from "@/tests/support/make-bag";
import { zipBag } from "@/tests/support/zip-bag";
import { flipArchive, flipFiles, flipForScript, type Tally, type ZipFlip } from "./flips";
import { zipParts } from "./zip-map";

// Every byte of a small bundle flipped, one at a time: `node --import tsx scripts/tamper/bundle-flips.ts [SEED]`.
// Writes docs/bundle-flips.md. Takes some ten minutes, most of them in check.sh.
const seed = Number(process.argv[2] ?? 1);
const all = (_: string, length: number) => Array.from({ length }, (__, i) => i);

/** Files of which check.sh is run on every byte; of the others on a sample. */
const WHOLE = /^(bagit\.txt|bag-info\.txt|tagmanifest-sha256\.(txt|sig)|data\/seal\/seal\.(txt|sig))$/;
const SAMPLE = 12;

const bag = makeBag({ drives: 1, imageBytes: 64 });
const zip = await zipBag(bag);
const say = (line: string) => process.stderr.write(`${line}\n`);

say("Files, by the page's check");
const byPage = await flipFiles(bag, all);

say("The archive, by the page's check and unzip -t");
const flips = await flipArchive(zip, all("", zip.length), true);

say("Files, by check.sh");
const random = randomOf(seed);
const scriptFlips = [...bag].filter(([name]) => name !== "check.sh").flatMap(([name, bytes]) =>
  (WHOLE.test(name) ? all(name, bytes.length) : Array.from({ length: SAMPLE }, () => random.below(bytes.length))).map((at) => ({ name, at })));
const byScript = await flipForScript(bag, scriptFlips, 2);

const sum = (tallies: Iterable<Tally>, what: "flips" | "found" | "namedFirst") => [...tallies].reduce((n, tally) => n + tally[what], 0);
const of = (tally: Tally | undefined) => (tally ? `${withCommas(tally.found)} of ${withCommas(tally.flips)}` : "not run");

function fileTable(): string[] {
  return [...bag.keys()].map((name) => {
    const page = byPage.get(name)!;
    return `| \`${name}\` | ${of(page)} | ${withCommas(page.namedFirst)} | ${of(byScript.get(name))} |`;
  });
}

/** Archive flips by the part of the archive that they hit. */
function archiveTable(): string[] {
  const parts = zipParts(zip);
  const groups = new Map<string, ZipFlip[]>();
  let next = 0;
  for (const flip of flips) {
    while (parts[next + 1] && flip.at >= parts[next + 1].start) next += 1;
    const part = parts[next];
    const name = part && flip.at < part.start + part.length ? part.name : "between entries";
    groups.set(name, [...(groups.get(name) ?? []), flip]);
  }
  return [...groups].map(([name, list]) => {
    const unseen = list.filter((flip) => !flip.page && !flip.unzip).length;
    return `| ${name} | ${withCommas(list.length)} | ${withCommas(list.filter((flip) => flip.page).length)} | ${withCommas(list.filter((flip) => flip.unzip).length)} | ${withCommas(unseen)} |`;
  });
}

const seen = flips.filter((flip) => flip.page).length;
const onlyUnzip = flips.filter((flip) => !flip.page && flip.unzip).length;
const nobody = flips.filter((flip) => !flip.page && !flip.unzip).length;
writeFileSync("docs/bundle-flips.md", `# Every byte of a bundle, flipped one at a time

Made by \`node --import tsx scripts/tamper/bundle-flips.ts ${seed}\`: a bundle of one drive with three images of 64 bytes, a seal and its proof, ${bag.size} files, as an archive of ${withCommas(zip.length)} bytes. At each place one bit is turned over, bit number place modulo 8. "The page" is lib/core/verify, the code behind /verify and \`npm run check:bundle\`.

## In the unpacked files

- The page: **${withCommas(sum(byPage.values(), "found"))} of ${withCommas(sum(byPage.values(), "flips"))}** found; in ${withCommas(sum(byPage.values(), "namedFirst"))} of them the first thing that it names is the file itself. In the others it first names what speaks of the file: a changed list is seen by the digests that no longer fit it.
- check.sh: **${withCommas(sum(byScript.values(), "found"))} of ${withCommas(sum(byScript.values(), "flips"))}** found. It was run on every byte of the small files and on ${SAMPLE} places of each other one (seed ${seed}). Not on its own bytes: a changed check.sh can say anything, which is why the page and the commands of README.txt see whether it was changed.

| file | the page | names it first | check.sh |
|---|---|---|---|
${fileTable().join("\n")}

## In the bytes of the archive

- The page: **${withCommas(seen)} of ${withCommas(flips.length)}** found; \`unzip -t\` alone saw ${withCommas(onlyUnzip)} more, and ${withCommas(nobody)} are seen by neither.
- What nobody sees changes no file and no name: dates and times, the program and version that an entry claims to be made by or for, and attributes that say how a file is to be shown. The lists and signatures are over the files' names and contents, and those stay what they were.

| part of the archive | flips | the page | \`unzip -t\` | neither |
|---|---|---|---|---|
${archiveTable().join("\n")}
`);
process.exitCode = sum(byPage.values(), "found") === sum(byPage.values(), "flips") && sum(byScript.values(), "found") === sum(byScript.values(), "flips") ? 0 : 1;
