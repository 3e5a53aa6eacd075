import { execFileSync, spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { makeReport } from "@/lib/report/make-report";
import type { ReportFacts } from "@/lib/report/report-facts";
import { cellsOver } from "@/lib/report/strip-drawing";
import { sfntOf } from "@/lib/report/woff";
import { LOST_CONTACT, madeCase, ONE_SIDED } from "../support/report-facts";

const work = mkdtempSync(path.join(os.tmpdir(), "twinread-report-"));
afterAll(() => rmSync(work, { recursive: true, force: true }));

async function pdfOf(facts: ReportFacts, name: string): Promise<string> {
  const file = path.join(work, `${name}.pdf`);
  writeFileSync(file, await makeReport(facts));
  return file;
}

const run = (command: string, ...args: string[]) => execFileSync(command, args, { encoding: "utf8", maxBuffer: 64 * 1024 * 1024 });
/** In the order of the page's content, white space folded: a sentence may run over lines. */
const textOf = (file: string) => run("pdftotext", "-raw", file, "-").replace(/\s+/g, " ");
const bare = (text: string) => text.replace(/\s+/g, "");
const HEX = /\b[0-9a-f]{64}\b/g;

describe("the report of a case", () => {
  const facts = madeCase({ text: "Looked at each strip; the reads agree, and I say so in a sentence that is long enough to run over the end of a line." });
  let file = "";
  let text = "";
  beforeAll(async () => {
    file = await pdfOf(facts, "case");
    text = textOf(file);
  });

  it("tells how the parcel came, what the start-up tests showed and what went back", () => {
    for (const words of [
      "One corner crushed, padding whole; by Marsh Post; tracking MP 7781 20", "not as it was sent, number S-90211", "Serial number is not so: 9KQ3-70BB-D2.", "Start-up tests of Drive A",
      "It spins, gets ready and reports another serial than its label; 1 attempt. It reported the serial ZZ-1.", "It spins, gets ready and reports the serial of its label; 2 attempts.",
      "to Lindmoor Veterinary Practice, by Marsh Post, seal S-90212; sent by Ines Okafor", "Drive A; Original board. The cable is in the same box.",
    ]) expect(text).toContain(words);
  });

  it("holds every digest in full and every finding with its advice", () => {
    const { logs: _logs, drawing: _drawing, ...rest } = facts;
    const digests = new Set(JSON.stringify(rest).match(HEX));
    expect(digests.size).toBeGreaterThan(5);
    for (const digest of digests) expect(text).toContain(digest);
    for (const finding of [LOST_CONTACT, ONE_SIDED]) {
      expect(bare(text)).toContain(bare(`${finding.message} ${finding.advice} Measured: ${finding.measured}; threshold: ${finding.threshold}.`));
    }
  });

  it("says who took part, what was approved on what grounds, and that a composite is derived", () => {
    for (const words of [
      "Lindmoor Veterinary Practice", "Zoë Šimková", "Mira Hollis", "Ines Okafor", "PN 4471-0093-B", "Donor board 1, BX 40-3179 rev D", "Another revision: rev D; the original has rev C.", "512 KiB (taken from the marking)",
      "Both read-backs equal the approved image in all 524,288 bytes.", "“Looked at each strip;", "This family keeps its parameters in few bytes.", "Derived, not read: nothing ever read this image as a whole.", "by bit majority, n=3",
      "The clip sat badly", "Seal 12", "What this does not promise", "Equals Reads 3 and 4 byte for byte.", "Equals Read 5 byte for byte. Differs from Read 1 in 214 bytes.", "Equals Own 2 byte for byte.", "File as it came: u12 first try.bin", "8192CC68",
    ]) expect(bare(text)).toContain(bare(words));
  });

  it("lists each entry of the log with its sentence and short hash", () => {
    for (const entry of facts.logs[0]) {
      expect(bare(text)).toContain(bare(entry.sentence));
      expect(text).toContain(`${entry.hash.slice(0, 8)}…${entry.hash.slice(-8)}`);
    }
  });

  it("is a sound, tagged file with a title, bookmarks, numbered pages and every face inside", () => {
    expect(run("qpdf", "--check", file)).toContain("No syntax or stream encoding errors found");
    const info = run("pdfinfo", file);
    expect(info).toMatch(/Title: +Case 26-0183: report of the case bundle/);
    expect(info).toMatch(/Tagged: +yes/);
    const pages = Number(/Pages: +(\d+)/.exec(info)?.[1]);
    for (let page = 1; page <= pages; page += 1) expect(text).toContain(`Page ${page} of ${pages}`);
    const fonts = run("pdffonts", file).trim().split("\n").slice(2);
    expect(fonts.length).toBeGreaterThan(3);
    for (const line of fonts) expect(line).toMatch(/Atkinson\S+ +CID TrueType +Identity-H +yes +yes +yes/);
    const catalog = run("qpdf", "--qdf", "--object-streams=disable", file, "-");
    expect(catalog).toContain("/Lang (en)");
    expect((catalog.match(/\/Title /g) ?? []).length).toBeGreaterThan(10);
    expect(run("pdfinfo", "-struct", file)).toMatch(/H1[\s\S]*H2[\s\S]*Table[\s\S]*Figure/);
  });

  it("comes out the same, byte for byte, from the same facts", async () => {
    expect(await makeReport(structuredClone(facts))).toEqual(readFileSync(file));
  });
});

it("shows a character that no face has as its code, and lets no long value run over the edge", async () => {
  const evil = `../../${"שלום".repeat(3)}\u202e\u0000\ud800 日本 😀\u200b e\u0301 \u00a0${"long".repeat(1000)}`;
  const facts = madeCase({ reads: 1, entries: 3, fileName: evil, designator: "U\u202e1/../3", text: "a\tb\r\nc\u2028d" });
  const file = await pdfOf(facts, "evil");
  // without the heads and feet of the pages
  const text = bare(textOf(file)).replace(/HaldenStreetDataWorkshopCase26-0183,reportofthecasebundle|HeadofDriveA:entry3,\S{8}…\S{8}Page\dof\d/g, "");
  for (const code of ["U+05E9U+05DCU+05D5U+05DD", "U+202EU+0000U+D800", "U+65E5U+672C", "U+1F600U+200B", "cU+2028d"]) expect([code, text.includes(code)]).toEqual([code, true]);
  expect(text.includes("long".repeat(1000))).toBe(true);
  expect(run("qpdf", "--check", file)).toContain("No syntax");
  // whatever is drawn lies between the margins
  for (const [, left, right] of run("pdftotext", "-bbox", file, "-").matchAll(/<word xMin="([\d.]+)" yMin="[\d.]+" xMax="([\d.]+)"/g)) {
    expect(Number(left)).toBeGreaterThan(47);
    expect(Number(right)).toBeLessThan(548.5);
  }
});

it("takes a chip of 60 reads and a log of 2,000 entries, and lets others have the thread meanwhile", async () => {
  const facts = madeCase({ reads: 60, entries: 2000 });
  let turns = 0;
  let going = true;
  const count = () => {
    turns += 1;
    if (going) setImmediate(count);
  };
  count();
  const file = await pdfOf(facts, "long");
  going = false;
  expect(turns).toBeGreaterThan(30);
  const text = textOf(file);
  for (const read of facts.record.drives[0].boards[0].chips[0].reads) expect(text).toContain(`${read.name} `);
  for (const seq of [1, 999, 2000]) expect(text).toContain(facts.logs[0][seq - 1].hash.slice(0, 8));
  expect(spawnSync("qpdf", ["--check", file]).status).toBe(0);
}, 120_000);

describe("a strip over a window longer than its image", () => {
  it("shows what lies past the image's end as not read, and stays itself over its own size", () => {
    const cells = `${"d".repeat(128)}${"b".repeat(128)}`;
    expect(cellsOver(cells, 4096, 4096)).toBe(cells);
    const half = cellsOver(cells, 2048, 4096);
    expect(half).toBe(`${"d".repeat(64)}${"b".repeat(64)}${"n".repeat(128)}`);
  });

  it("never hides data under fill when cells are joined", () => {
    const cells = `d${"b".repeat(255)}`;
    expect(cellsOver(cells, 2048, 4096)[0]).toBe("d");
  });
});

describe("a face taken out of its WOFF file", () => {
  // OpenType 1.9, "Calculating checksums": the sum of a table's 32-bit words; each directory entry states it
  it("has tables whose checksums are those of its directory", () => {
    const font = sfntOf(readFileSync("node_modules/@fontsource/atkinson-hyperlegible-next/files/atkinson-hyperlegible-next-latin-400-normal.woff"));
    const tables = font.readUInt16BE(4);
    expect(tables).toBeGreaterThan(8);
    for (let i = 0; i < tables; i += 1) {
      const at = 12 + i * 16;
      const [tag, stated, offset, length] = [font.toString("latin1", at, at + 4), font.readUInt32BE(at + 4), font.readUInt32BE(at + 8), font.readUInt32BE(at + 12)];
      let sum = 0;
      for (let word = offset; word < offset + length; word += 4) sum = (sum + font.readUInt32BE(word)) >>> 0;
      // a head table's own field for the whole font counts as zero
      if (tag === "head") sum = (sum - font.readUInt32BE(offset + 8)) >>> 0;
      expect([tag, sum]).toEqual([tag, stated]);
    }
  });

  it("refuses what is no WOFF file", () => {
    expect(() => sfntOf(Buffer.from("OTTO and more"))).toThrow(RangeError);
  });
});
