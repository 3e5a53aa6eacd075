import { spawnSync } from "node:child_process";
import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, utimesSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { printIntelHex } from "@/lib/core/intel-hex";
import { printSRecord } from "@/lib/core/s-record";
import { fill, goldenImage, sha256Hex, stream } from "../core/stream";

const root = path.resolve(import.meta.dirname, "../..");
const LAUNCH = path.join(root, "scripts/inspect/launch.mjs");
const folder = mkdtempSync(path.join(tmpdir(), "inspect-"));
afterAll(() => rmSync(folder, { recursive: true }));

const REAL = "/usr/share/seabios/bios-256k.bin";
const REAL_SHA = "2da2018c7555e50b660a84a273a14a79cb87b9070fe6a90e9f151a53e357f7e6";

function file(name: string, content: Uint8Array | string): string {
  const at = path.join(folder, name);
  mkdirSync(path.dirname(at), { recursive: true });
  writeFileSync(at, content);
  return at;
}
function inspect(...words: string[]) {
  const { status, stdout, stderr } = spawnSync(process.execPath, [LAUNCH, ...words], { encoding: "utf8", maxBuffer: 64 * 1024 * 1024 });
  return { status, stdout, stderr };
}
interface Answer {
  reads: { file: string; sizeBytes: number; crc32: string; sha256: string; findings: { code: string; severity: string; message: string; advice: string }[] }[];
  comparisons: { reads: [number, number]; equal: boolean; differingBytes: number; differingBits: { zeroToOne: number; oneToZero: number }; ranges: { start: number; length: number }[]; truncated?: boolean; diagnosis: { code: string; message: string; advice: string; confidence: string } }[];
  verdict: { ready: boolean; sentence: string };
}
function json(...words: string[]): { status: number | null; answer: Answer } {
  const { status, stdout, stderr } = inspect(...words, "--json");
  expect(stderr).toBe("");
  return { status, answer: JSON.parse(stdout) as Answer };
}
const three = (name: string, ...images: Uint8Array[]) => images.map((image, i) => file(`${name}-${i + 1}.bin`, image));

// the first call may have to build the tool
beforeAll(() => expect(inspect("--help").status).toBe(0), 60_000);

describe("reads that are equal and clean", () => {
  it("end with 0, and the digests are those of the files", () => {
    const image = new Uint8Array(readFileSync(REAL));
    const { status, answer } = json(...three("real", image, image, image), "--size", "262144");
    expect(status).toBe(0);
    expect(answer.reads.map((read) => [read.sizeBytes, read.crc32, read.sha256])).toEqual(Array(3).fill([262_144, "f9aa9dbd", REAL_SHA]));
    expect(answer.reads.flatMap((read) => read.findings)).toEqual([]);
    expect(answer.comparisons.map((pair) => [pair.reads, pair.equal, pair.differingBytes, pair.ranges, pair.diagnosis.code])).toEqual([[1, 2], [1, 3], [2, 3]].map((reads) => [reads, true, 0, [], "equal"]));
    expect(answer.verdict).toMatchObject({ ready: true });
    expect(Object.keys(answer)).toEqual(["reads", "comparisons", "verdict"]);
    expect(Object.keys(answer.reads[0])).toEqual(["file", "sizeBytes", "crc32", "sha256", "findings"]);
    expect(Object.keys(answer.comparisons[0])).toEqual(["reads", "equal", "differingBytes", "differingBits", "ranges", "diagnosis"]);
  });
  it("end with 0 also where findings are notes only", () => {
    const { status, answer } = json(...three("odd", goldenImage().slice(0, 7000), goldenImage().slice(0, 7000)));
    expect(answer.reads[0].findings).toContainEqual(expect.objectContaining({ code: "size-not-power-of-two", severity: "note" }));
    expect([status, answer.verdict.ready]).toEqual([0, true]);
    expect(answer.verdict.sentence).toMatch(/Take 1 more read\./);
  });
  it("say of a single read that it can't be compared", () => {
    const { status, answer } = json(REAL);
    expect([status, answer.comparisons]).toEqual([0, []]);
    expect(answer.verdict.sentence).toMatch(/can't be compared/);
  });
});

describe("reads with something against them", () => {
  it("end with 1 where one differs, with exact counts", () => {
    const good = goldenImage();
    const off = good.slice().fill(0xff, 0x300, 0x340);
    const { status, answer } = json(...three("burst", good, off, good));
    expect(status).toBe(1);
    expect(answer.comparisons[0]).toMatchObject({ equal: false, differingBytes: 63, differingBits: { zeroToOne: 270, oneToZero: 0 }, diagnosis: { code: "lost-contact" } });
    expect(answer.comparisons[0].ranges.reduce((sum, one) => sum + one.length, 0)).toBe(63);
    expect(answer.verdict).toMatchObject({ ready: false });
    expect(answer.verdict.sentence).toMatch(/^Read 2 differs in 63 bytes/);
  });
  it("say what the difference looks like, and in which read", () => {
    const good = goldenImage();
    const late = Uint8Array.from([...good.subarray(0, 0x400), ...good.subarray(0x401), 0xff]);
    const { status, answer } = json(...three("slip", good, good, late));
    expect(status).toBe(1);
    expect(answer.comparisons.map((pair) => pair.diagnosis.code)).toEqual(["equal", "byte-slip", "byte-slip"]);
    expect(answer.verdict.sentence).toMatch(/^Read 3 differs in 2,989 bytes.*looks like/);
  });
  it("end with 1 although all agree, when they are blank, too short, too long or one file twice", () => {
    const codes = (words: string[]) => {
      const { status, answer } = json(...words);
      expect([status, answer.verdict.ready]).toEqual([1, false]);
      return answer.reads.map((read) => read.findings.filter((one) => one.severity !== "note").map((one) => one.code));
    };
    const image = goldenImage();
    expect(codes(three("blank", fill(4096, 0xff), fill(4096, 0xff)))).toEqual([["blank"], ["blank"]]);
    expect(codes([...three("short", image, image), "--size", "16384"])).toEqual([["too-short"], ["too-short"]]);
    expect(codes([...three("long", image, image), "--size", "0x1000"])).toEqual([["extra-bytes"], ["extra-bytes"]]);
    expect(codes([file("one.bin", image), path.join(folder, "one.bin")])).toEqual([[], ["copy-not-a-read"]]);
  });
  it("know a copied file by name and time", () => {
    const [a, b] = [file("p/same.bin", goldenImage()), file("q/same.bin", goldenImage())];
    for (const at of [a, b]) utimesSync(at, 1_700_000_000, 1_700_000_000);
    expect(json(a, b).answer.reads[1].findings[0].code).toBe("copy-not-a-read");
    utimesSync(b, 1_700_000_001, 1_700_000_001);
    expect(json(a, b).status).toBe(0);
  });
  it("list as many ranges as they have, and say where the list stops", () => {
    const other = fill(65_536, 0).map((_, i) => (i % 2 ? 0x55 : 0));
    const { answer } = json(...three("many", fill(65_536, 0), other));
    expect(answer.comparisons[0]).toMatchObject({ differingBytes: 32_768, truncated: true });
    expect(answer.comparisons[0].ranges).toHaveLength(10_000);
  });
});

describe("texts", () => {
  const image = stream("bench-seed-1", 512);
  it.each([["intel-hex", printIntelHex], ["s-record", printSRecord]] as const)("of kind %s give the image they hold", (format, print) => {
    const { status, answer } = json(file(`plain-${format}`, print(image)), "--format", format);
    expect([status, answer.reads[0].sizeBytes, answer.reads[0].sha256]).toEqual([0, 512, sha256Hex(image)]);
    const based = json(file(`based-${format}`, print(image, { base: 0x8000 })), "--format", format, "--base", "0x8000", "--size", "1024", "--fill", "0");
    expect([based.answer.reads[0].sizeBytes, based.answer.reads[0].sha256]).toEqual([1024, sha256Hex(Uint8Array.from([...image, ...fill(512, 0)]))]);
  });
  it("that are wrong end with 2 and name the line", () => {
    const bad = file("bad.hex", printIntelHex(image).replace(":10002000", ":10002001"));
    expect(inspect(bad, "--format", "intel-hex")).toMatchObject({ status: 2, stdout: "", stderr: expect.stringMatching(/bad\.hex: Line 3 has the checksum .., and its bytes give ..\. Save the text again/) });
  });
  it("that would expand past 64 MiB are refused", () => {
    const bomb = file("bomb.hex", ":0100000001FE\n:02000004FFFFFC\n:01FFFF0002FF\n:00000001FF\n");
    expect(inspect(bomb, "--format", "intel-hex")).toMatchObject({ status: 2, stdout: "", stderr: expect.stringMatching(/at most 67108864 bytes/) });
  });
});

describe("what can't be read ends with 2, nothing on standard output and what to do", () => {
  it.each([
    ["a missing file", () => [path.join(folder, "missing.bin")], /there is no such file\. Check the name/],
    ["a missing file among others", () => [REAL, path.join(folder, "missing.bin"), "--json"], /missing\.bin: there is no such file/],
    ["a folder", () => [folder], /it is no file/],
    ["an empty file", () => [file("empty.bin", "")], /it is empty\. Read the chip again/],
    ["a file over 64 MiB", () => [file("huge.bin", fill(64 * 1024 * 1024 + 1, 1))], /more than any chip's image here/],
    ["no file", () => [], /Name one or more files/],
    ["an unknown option", () => [REAL, "--sise", "1"], /--sise/],
    ["an unknown format", () => [REAL, "--format", "zip"], /Choose raw, intel-hex, s-record/],
    ["a size in words", () => [REAL, "--size", "512K"], /Write it like 4096 or 0x1000/],
    ["a size of 0", () => [REAL, "--size", "0"], /no number from 1/],
    ["a base for a raw image", () => [REAL, "--base", "0"], /go with --format/],
  ])("%s", (_name, words, sentence) => {
    expect(inspect(...words())).toMatchObject({ status: 2, stdout: "", stderr: expect.stringMatching(sentence) });
  });
});

describe("for people", () => {
  it("one page says what it is, how it differs and what to do", () => {
    const good = goldenImage();
    const { status, stdout, stderr } = inspect(...three("page", good, good, good.slice().fill(0xff, 0x300, 0x340)));
    expect([status, stderr]).toEqual([1, ""]);
    expect(stdout).toContain("Read 1  ");
    expect(stdout).toContain("8 KiB (8,192 bytes)   CRC-32 AE74BFE0");
    expect(stdout).toContain("SHA-256 504bc4f5 9fc5e628 be38f6b4 17026ad3 88a98421 624bae62 f7d00438 acd4b88f");
    expect(stdout).toContain("\n  oooooooooooooooooooooooo........o......oooooooo.................\n");
    expect(stdout).toContain("Reads 1 and 2: equal.");
    expect(stdout).not.toContain("Reads 2 and 3");
    expect(stdout).toMatch(/Reads 1 and 3: .*looks like lost contact/);
    expect(stdout).toContain("\n        ^\n");
    expect(stdout).toMatch(/\nVerdict: Read 3 differs in 63 bytes/);
    expect(stdout).not.toMatch(/!|undefined|null/);
  });
  it("starts in well under a second from the built file", () => {
    inspect("--help");
    const from = performance.now();
    inspect(REAL);
    expect(performance.now() - from).toBeLessThan(1000);
    expect(existsSync(path.join(root, "dist/inspect.mjs"))).toBe(true);
  });
});
