import { execFile } from "node:child_process";
import { randomUUID } from "node:crypto";
import { createWriteStream, mkdtempSync, readdirSync, readFileSync, rmSync, statSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { Readable } from "node:stream";
import { pipeline } from "node:stream/promises";
import { promisify } from "node:util";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { approveImage } from "@/lib/commands/approve-image";
import { bundleReport } from "@/lib/commands/bundle-report";
import { startBundle } from "@/lib/commands/bundle-plan";
import { handOutImage } from "@/lib/commands/hand-out-image";
import { makeBundle } from "@/lib/commands/make-bundle";
import { recordChip } from "@/lib/commands/record-chip";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { setReadAside } from "@/lib/commands/set-read-aside";
import { storeReads } from "@/lib/commands/store-reads";
import type { Actor } from "@/lib/core/words";
import { chipView } from "@/lib/queries/chip-view";
import { chainEntries } from "@/lib/queries/custody";
import { readFields } from "@/lib/schemas/read";
import { receive } from "@/storage";
import { firmware, type MadeChip, makeChip, makeReady, makeUser, refusalOf, sha256, store } from "../support/factory";

const run = promisify(execFile);
const work = mkdtempSync(path.join(os.tmpdir(), "twinread-report-bundle-"));
afterAll(() => rmSync(work, { recursive: true, force: true }));

const seed = randomUUID();
const image = firmware(`report ${seed}`, 8192);
let technician: Actor;
let lead: Actor;
let chip: MadeChip;

async function bundleOf(one: MadeChip, name: string): Promise<{ zip: string; dir: string; bag: string }> {
  const zip = path.join(work, `${name}.zip`);
  await pipeline((await makeBundle(lead, one.caseId)).stream, createWriteStream(zip));
  const dir = mkdtempSync(path.join(work, `${name}-`));
  await run("unzip", ["-q", zip, "-d", dir]);
  return { zip, dir, bag: path.join(dir, `twinread-${one.ref}`) };
}

const bare = (text: string) => text.replace(/\s+/g, "");
const textOf = async (file: string) => bare((await run("pdftotext", ["-raw", file, "-"], { maxBuffer: 64 * 1024 * 1024 })).stdout);
const filesOf = (dir: string) => readdirSync(dir, { recursive: true, encoding: "utf8" }).filter((name) => statSync(path.join(dir, name)).isFile());

beforeAll(async () => {
  technician = await makeUser("technician");
  lead = await makeUser("lead");
  chip = await makeChip(technician);
  await makeReady(technician, chip, image, firmware(`report donor ${seed}`, 8192));
  const differs = Buffer.from(image);
  differs.fill(0xff, 2048, 2100);
  await store(technician, chip.chipId, "before", differs, 2);
  const odd = (await chipView(lead, chip.chipId)).reads.find((r) => r.stage === "before" && r.number === 4)!;
  await setReadAside(lead, odd.id, { reason: "Slipped clip" });
  const approval = await approveImage(lead, chip.chipId, { sha256: sha256(image), donorChipId: chip.donorChipId, statement: "Three clean reads.", reasons: {}, lookedAt: [] });
  await recordTransfer(technician, approval.id, { kind: "write", donorChipId: chip.donorChipId });
  for (const seating of [1, 2]) await store(technician, chip.donorChipId, "after", image, seating);
});

describe("the report in a bundle", () => {
  it("holds every digest of the record, every finding and every entry's sentence", async () => {
    const { bag } = await bundleOf(chip, "whole");
    const file = path.join(bag, "data/report.pdf");
    const text = await textOf(file);
    const source = readFileSync(path.join(bag, "data/case.json"), "utf8");
    for (const digest of new Set(source.match(/\b[0-9a-f]{64}\b/g))) expect([digest, text.includes(digest)]).toEqual([digest, true]);
    const view = await chipView(lead, chip.chipId);
    const findings = view.reads.flatMap((read) => read.findings);
    expect(findings.length).toBeGreaterThan(0);
    for (const { message } of findings) expect([message, text.includes(bare(message))]).toEqual([message, true]);
    expect(text).toContain(bare(view.state.sentence));
    const { seq } = (JSON.parse(source) as { drives: { logUpTo: { seq: number } }[] }).drives[0].logUpTo;
    for (const entry of (await chainEntries(chip.driveId)).slice(0, seq)) {
      expect([entry.sentence, text.includes(bare(entry.sentence))]).toEqual([entry.sentence, true]);
      expect(text).toContain(`${entry.hash.slice(0, 8)}…${entry.hash.slice(-8)}`);
    }
    expect(text).toContain(bare("52 bytes differ"));
    expect((await run("qpdf", ["--check", file])).stdout).toContain("No syntax or stream encoding errors");
  });

  it("names the seal and its key as the bundle holds them", async () => {
    const { bag } = await bundleOf(chip, "sealed");
    const text = await textOf(path.join(bag, "data/report.pdf"));
    expect(text).toContain(sha256(readFileSync(path.join(bag, "data/seal/seal.txt"))));
    const { stdout } = await run("sh", ["-c", "openssl pkey -pubin -in data/seal/seal-key.pem -outform DER | sha256sum"], { cwd: bag });
    expect(text).toContain(stdout.split(" ")[0]);
  });

  it("comes from the plan alone: what is recorded later changes nothing", async () => {
    const plan = await startBundle(lead, chip.caseId);
    const before = await bundleReport(plan);
    await store(technician, chip.chipId, "before", image, 3);
    expect((await bundleReport(plan)).equals(before)).toBe(true);
  });

  it("lists an image that was handed out", async () => {
    const read = (await chipView(lead, chip.chipId)).reads.find((one) => one.stage === "before")!;
    await handOutImage(lead, read.id, { reason: "Second opinion" });
    const { bag } = await bundleOf(chip, "handed-out");
    expect(await textOf(path.join(bag, "data/report.pdf"))).toContain(bare("Second opinion"));
  });
});

describe("names from hostile uploads", () => {
  const NAMES = [
    "../../../../etc/passwd", "..\\..\\boot.ini", "/etc/shadow", "a\u0000b.bin", "\u202egnp.exe", "CON", "nul.txt", "-rf", "--help", "~", "$(touch x)`x`;x|x", "a\nb\r\nc", " ", ".", "…", "../".repeat(341), "שם.bin", "😀.bin", "data/manifest-sha256.txt",
  ];
  const DESIGNATORS = ["../..", "/", "-U1", "U\u202e9", "CON", "U 1\n", ".."];

  it("stay data: no file of the bundle bears one, and nothing lies outside its folder", async () => {
    const evil = await makeChip(technician);
    // in one call, as a bench station sends them
    const files = await Promise.all(NAMES.map(async (fileName) => ({ fileName, arrived: await receive(Readable.from([image])) })));
    await storeReads(technician, evil.chipId, readFields.parse({ stage: "before", seating: 1, reader: "R2", supplyMillivolts: 3300 }), files);
    for (const designator of DESIGNATORS) {
      const made = await recordChip(technician, evil.originalBoardId, { designator, bus: "spi", sizeBytes: 8192, sizeSource: "typed", supplyMillivolts: 3300, needsTransfer: true });
      await store(technician, made.id, "before", firmware(`${seed} ${designator}`, 8192), 1, {}, `${designator}.bin`);
    }
    // a name that is too long to be kept whole keeps its read out, with a sentence
    expect(await refusalOf(store(technician, evil.chipId, "before", image, 1, {}, "../".repeat(1365)))).toEqual({
      code: "does-not-fit", detail: "A file’s name has 4,095 characters; up to 1,024 are kept with a read. Rename the file and send it again; nothing was stored.",
    });
    const { zip, dir, bag } = await bundleOf(evil, "hostile");
    await run("unzip", ["-tq", zip]);
    for (const list of ["manifest-sha256.txt", "tagmanifest-sha256.txt"]) await run("sha256sum", ["-c", "--strict", "--quiet", list], { cwd: bag });
    const { stdout } = await run("unzip", ["-Z1", zip]);
    const listed = stdout.trimEnd().split("\n");
    for (const name of listed) {
      expect(name).toMatch(/^twinread-[0-9-]+\/[A-Za-z0-9._/-]+$/);
      for (const part of name.split("/")) expect([".", "..", ""]).not.toContain(part);
      for (const part of name.split("/")) expect(part).not.toMatch(/^-|^(con|nul|prn|aux|com\d|lpt\d)(\.|$)/i);
    }
    expect(readdirSync(dir)).toEqual([`twinread-${evil.ref}`]);
    expect(filesOf(bag).filter((name) => name.endsWith(".bin"))).toHaveLength(NAMES.length + DESIGNATORS.length);
    // nothing lost either: each name is in the record as it came, and readable in the report
    const record = JSON.parse(readFileSync(path.join(bag, "data/case.json"), "utf8")) as { drives: { boards: { chips: { reads: { originalFileName: string }[] }[] }[] }[] };
    const names = record.drives[0].boards[0].chips.flatMap((one) => one.reads.map((read) => read.originalFileName));
    for (const name of NAMES) expect(names).toContain(name);
    const text = await textOf(path.join(bag, "data/report.pdf"));
    for (const seen of ["../../../../etc/passwd", "aU+0000b.bin", "U+202Egnp.exe", "U+05E9U+05DD.bin", "U+1F600"]) expect([seen, text.includes(seen)]).toEqual([seen, true]);
    expect((await run("sh", [path.join(bag, "check.sh")])).stdout).toContain("keys not compared");
  }, 180_000);
});
