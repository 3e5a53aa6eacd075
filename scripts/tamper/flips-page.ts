import { withCommas } from "@/lib/core/quantity";
import type { Bag } from "@/tests/support/make-bag";
import type { Tally, ZipFlip } from "./flips";
import type { ZipPart } from "./zip-map";

export interface FlipsFound {
  seed: string;
  bag: Bag;
  zip: Buffer;
  parts: ZipPart[];
  byPage: ReadonlyMap<string, Tally>;
  byScript: ReadonlyMap<string, Tally>;
  /** by place */
  flips: ZipFlip[];
  sample: number;
  unzipContent: number;
}

const sum = (tallies: ReadonlyMap<string, Tally>, what: "flips" | "found" | "namedFirst") => [...tallies.values()].reduce((n, tally) => n + tally[what], 0);
const of = (tally: Tally | undefined) => (tally ? `${withCommas(tally.found)} of ${withCommas(tally.flips)}` : "not run");

function fileTable({ bag, byPage, byScript }: FlipsFound): string {
  return [...bag.keys()].map((name) => `| \`${name}\` | ${of(byPage.get(name))} | ${withCommas(byPage.get(name)?.namedFirst ?? 0)} | ${of(byScript.get(name))} |`).join("\n");
}

/** Archive flips by the part of the archive that they hit. */
function groups({ parts, flips }: FlipsFound): Map<string, ZipFlip[]> {
  const found = new Map<string, ZipFlip[]>();
  let next = 0;
  for (const flip of flips) {
    while (parts[next + 1] && flip.at >= parts[next + 1].start) next += 1;
    const part = parts[next];
    const name = part && flip.at < part.start + part.length ? part.name : "between entries";
    found.set(name, [...(found.get(name) ?? []), flip]);
  }
  return found;
}

const unseen = (flip: ZipFlip) => !flip.page && flip.unzip !== true;

function archiveTable(found: FlipsFound): string {
  return [...groups(found)].map(([name, list]) => {
    const asked = list.filter((flip) => flip.unzip !== null);
    return `| ${name} | ${withCommas(list.filter((flip) => flip.page).length)} of ${withCommas(list.length)} | ${withCommas(asked.filter((flip) => flip.unzip).length)} of ${withCommas(asked.length)} | ${withCommas(list.filter(unseen).length)} |`;
  }).join("\n");
}

/** docs/bundle-flips.md */
export function flipsPage(found: FlipsFound): string {
  const { seed, bag, zip, byPage, byScript, flips, sample, unzipContent } = found;
  const nobody = [...groups(found)].filter(([, list]) => list.some(unseen)).map(([name, list]) => `${name} (${list.filter(unseen).length} of ${list.length})`);
  return `# Every byte of a bundle, flipped one at a time

Made by \`node --import tsx scripts/tamper/bundle-flips.ts ${seed}\`: a bundle of one drive with three images of 64 bytes, a seal and its proof, ${bag.size} files, as an archive of ${withCommas(zip.length)} bytes. At each place one bit is turned over, bit number place modulo 8. "The page" is lib/core/verify, the code behind /verify and \`npm run check:bundle\`.

## In the unpacked files

- The page: **${withCommas(sum(byPage, "found"))} of ${withCommas(sum(byPage, "flips"))}** found; in ${withCommas(sum(byPage, "namedFirst"))} of them the first thing that it names is the file itself. In the others it first names what no longer fits: where a list was changed, the file whose digest stands in the changed line.
- check.sh: **${withCommas(sum(byScript, "found"))} of ${withCommas(sum(byScript, "flips"))}** found. It was run on every byte of the small files and on ${sample} places of each other one (seed ${seed}). Not on its own bytes: a changed check.sh can say anything, which is why the page and the commands of README.txt see whether it was changed.

| file | the page | names it first | check.sh |
|---|---|---|---|
${fileTable(found)}

## In the bytes of the archive

- The page: **${withCommas(flips.filter((flip) => flip.page).length)} of ${withCommas(flips.length)}** found. \`unzip -t\` was run on every byte of the archive's own fields and on one of ${unzipContent} of the content; it alone saw ${withCommas(flips.filter((flip) => !flip.page && flip.unzip).length)} more. Neither sees ${withCommas(flips.filter(unseen).length)}: ${nobody.join("; ") || "none"}.
- What nobody sees changes no file and no name: dates and times, the program and version that an entry claims to be made by or for, attributes that say how a file is to be shown, and numbers that no reader here goes by (which disk, how many entries lie on it, how long a comment is that isn't there). The lists and signatures are over the files' names and contents, and those stay what they were.

| part of the archive | the page | \`unzip -t\` | neither |
|---|---|---|---|
${archiveTable(found)}
`;
}
