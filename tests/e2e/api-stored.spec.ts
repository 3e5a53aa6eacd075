import { execFileSync, spawnSync } from "node:child_process";
import { readdirSync, statSync, writeFileSync } from "node:fs";
import path from "node:path";
import { expect } from "@playwright/test";
import type { ComparisonView } from "@/lib/views";
import { dataFolder } from "./support/accounts";
import { chipOf, custodyOf, makePair, randomImage, sha256Of, store, type Stored, upload } from "./support/bench";
import { newFolder, sha256sum } from "./support/files";
import { call, done, tokenOf } from "./support/station";
import { incoming, storedImages } from "./support/store";
import { test } from "./support/test";

const MIB = 1024 * 1024;

let mira: string;
let ines: string;
test.beforeAll(async () => {
  mira = await tokenOf("mira");
  ines = await tokenOf("ines");
});

const imageFile = (sha256: string) => path.join(dataFolder(), "images/sha256", sha256.slice(0, 2), sha256);

for (const sizeBytes of [1, 12 * MIB, 64 * MIB]) {
  test(`an image of ${sizeBytes.toLocaleString("en")} bytes arrives whole, with the digest that sha256sum gives`, async () => {
    const pair = await makePair(mira, { customer: "Whole images", sizeBytes });
    const image = randomImage(sizeBytes);
    const [read] = (await store(mira, pair.chipId, "before", 1, [image])).reads;
    expect(read).toMatchObject({ sha256: sha256Of(image), sizeBytes, number: 1, counted: true });
    expect(sha256sum(imageFile(read.sha256))).toBe(read.sha256);
    expect(statSync(imageFile(read.sha256)).mode & 0o222, "nobody may write to a stored image").toBe(0);
    const tail = await call("GET", `/api/reads/${read.id}/bytes?offset=${Math.max(0, sizeBytes - 16)}&length=16`, { token: mira });
    expect(tail.bytes.equals(Buffer.from(image.subarray(-16)))).toBe(true);
    expect(incoming()).toEqual([]);
  });
}

for (const name of ["../../x", "..\\..\\x", "/etc/passwd", "read 1 \u00e9\u{1f9f0}.bin", "con.bin.", `${"long".repeat(60)}.bin`]) {
  test(`a file called ${name.slice(0, 20)} is stored, and its name is nothing but data`, async () => {
    const pair = await makePair(mira, { customer: "Odd names", sizeBytes: 512 });
    const image = randomImage(512);
    const before = readdirSync(dataFolder()).sort();
    const images = storedImages();
    const answer = await upload(mira, pair.chipId, {}, [{ bytes: image, name }]);
    expect(answer.status, answer.bytes.toString("utf8")).toBe(201);
    const [read] = answer.json<Stored>().reads;
    expect(read.fileName).toBe(name);
    expect(storedImages()).toEqual([...images, sha256Of(image)].sort());
    expect(readdirSync(dataFolder()).sort()).toEqual(before);
    const entry = (await custodyOf(mira, pair.driveId)).find((one) => one.action === "read.stored")!;
    expect(JSON.parse(entry.body)).toMatchObject({ facts: { fileName: name, sha256: sha256Of(image) } });
    // what leaves bears a name of ours
    const out = await call("POST", `/api/reads/${read.id}/download`, { token: ines, json: { reason: "Looking at its name." } });
    expect(out.headers.get("content-disposition")).toMatch(/^attachment; filename="\d\d-\d{4}_A_U7_Read-1_[0-9a-f]{8}\.bin"$/);
  });
}

/** What `cmp -l` prints, read as numbers: position from 1, then both bytes in octal. */
function cmp(a: string, b: string): { at: number; a: number; b: number }[] {
  const { stdout } = spawnSync("cmp", ["-l", a, b], { encoding: "utf8", maxBuffer: 64 * MIB });
  return stdout.trimEnd().split("\n").map((line) => {
    const [at, left, right] = line.trim().split(/\s+/);
    return { at: Number(at) - 1, a: parseInt(left, 8), b: parseInt(right, 8) };
  });
}

const ones = (byte: number) => byte.toString(2).replaceAll("0", "").length;

test("a comparison counts bytes, bits and ranges as cmp -l does", async () => {
  const sizeBytes = 262_144;
  const pair = await makePair(mira, { customer: "Compared with cmp", sizeBytes });
  const one = randomImage(sizeBytes);
  const two = one.slice();
  const noise = randomImage(700);
  two.set(noise.subarray(0, 300), 0);
  two.set(noise.subarray(300, 690), 131_000);
  two[200_000] ^= 0x80;
  two[sizeBytes - 1] ^= 0xff;
  await store(mira, pair.chipId, "before", 1, [one, two]);
  const folder = newFolder();
  const files = [one, two].map((bytes, index) => {
    const name = path.join(folder, `${index}.bin`);
    writeFileSync(name, bytes);
    return name;
  });
  const expected = cmp(files[0], files[1]);
  const ranges: { start: number; length: number }[] = [];
  for (const { at } of expected) {
    const last = ranges.at(-1);
    if (last && last.start + last.length === at) last.length += 1;
    else ranges.push({ start: at, length: 1 });
  }
  const compared = await done<ComparisonView>("GET", `/api/chips/${pair.chipId}/comparison?reads=1,2`, { token: mira });
  expect(compared).toMatchObject({
    equal: false, differingBytes: expected.length, ranges,
    differingBits: {
      zeroToOne: expected.reduce((sum, d) => sum + ones(~d.a & d.b & 0xff), 0), oneToZero: expected.reduce((sum, d) => sum + ones(d.a & ~d.b & 0xff), 0),
    },
  });
  const back = await done<ComparisonView>("GET", `/api/chips/${pair.chipId}/comparison?reads=2,1&stage=before`, { token: mira });
  expect(back.differingBits).toEqual({ zeroToOne: compared.differingBits.oneToZero, oneToZero: compared.differingBits.zeroToOne });
  expect(await done<ComparisonView>("GET", `/api/chips/${pair.chipId}/comparison?reads=1,1`, { token: mira })).toMatchObject({ equal: true, differingBytes: 0, ranges: [] });
});

test("a hand-out is written down before it leaves, and carries the digest of what leaves", async () => {
  const pair = await makePair(mira, { customer: "Handed out", sizeBytes: 300_000 });
  const image = randomImage(300_000);
  const [read] = (await store(mira, pair.chipId, "before", 1, [image])).reads;
  const out = await call("POST", `/api/reads/${read.id}/download`, { token: ines, json: { reason: "A second look on another bench." } });
  expect(out.status).toBe(200);
  expect(out.bytes.equals(Buffer.from(image))).toBe(true);
  const digest = execFileSync("openssl", ["dgst", "-sha256", "-binary"], { input: out.bytes }).toString("base64");
  expect(out.headers.get("repr-digest")).toBe(`sha-256=:${digest}:`);
  expect(out.headers.get("content-type")).toBe("application/octet-stream");
  expect(out.headers.get("x-content-type-options")).toBe("nosniff");
  expect(out.headers.get("cache-control")).toBe("no-store");
  const last = (await custodyOf(mira, pair.driveId)).at(-1)!;
  expect(JSON.parse(last.body)).toMatchObject({ action: "image.handed-out", facts: { sha256: read.sha256, sizeBytes: 300_000, reason: "A second look on another bench." } });
  // looking is no hand-out: it leaves no entry
  await chipOf(mira, pair.chipId);
  await call("GET", `/api/reads/${read.id}/bytes?offset=0&length=64`, { token: mira });
  expect((await custodyOf(mira, pair.driveId)).length).toBe(last.seq);
});
