import { spawnSync } from "node:child_process";
import { mkdtempSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import type { VerifyReport } from "@/lib/core/verify/report";
import { logKeyA, makeBag, sealKeyA, testKey } from "../support/make-bag";
import { writeBag } from "../support/verify-bag";
import { zipBag } from "../support/zip-bag";

vi.setConfig({ testTimeout: 60_000 });
const work = mkdtempSync(path.join(os.tmpdir(), "twinread-check-bundle-"));
afterAll(() => rmSync(work, { recursive: true, force: true }));
const root = path.resolve(import.meta.dirname, "../..");
const zip = path.join(work, "bundle.zip");
const bag = makeBag({ drives: 2 });

function check(...words: string[]) {
  const { status, stdout, stderr } = spawnSync(process.execPath, ["scripts/check/launch-bundle.mjs", ...words], { cwd: root, encoding: "utf8", env: { PATH: process.env.PATH, HOME: work, NODE_ENV: "test" } });
  return { status, stdout, stderr };
}

beforeAll(async () => {
  writeFileSync(zip, await zipBag(bag));
}, 60_000);

describe("npm run check:bundle", () => {
  it("ends with 0 for a bundle in order, as archive and unpacked, and needs no settings", () => {
    const packed = check(zip);
    expect([packed.status, packed.stderr]).toEqual([0, ""]);
    expect(packed.stdout).toContain("All in order: 2 custody logs, 12 entries, 25 files.");
    expect(packed.stdout).toContain("not checked: Whose keys they are. Keys not compared");
    writeBag(bag, path.join(work, "an unpacked one"));
    expect(check(path.join(work, "an unpacked one"), sealKeyA.id.toUpperCase())).toMatchObject({ status: 0 });
    expect(check(zip, ...logKeyA.id.match(/.{8}/g)!).stdout).toContain("The log key has the fingerprint that you gave.");
  });

  it("ends with 1 and names the file, for people and for programs", async () => {
    const name = "data/drives/2/original-U12/before-2.bin";
    const damaged = path.join(work, "damaged.zip");
    writeFileSync(damaged, await zipBag(new Map(bag).set(name, Buffer.alloc(64))));
    const { status, stdout } = check(damaged);
    expect(status).toBe(1);
    expect(stdout).toContain(`Not in order. ${name}: Its SHA-256`);
    const json = check(damaged, "--json");
    expect(json.status).toBe(1);
    const report = JSON.parse(json.stdout) as VerifyReport & { file: string };
    expect(report).toMatchObject({ file: damaged, verdict: "not-in-order", facts: { caseRef: "26-0042" } });
    expect(report.steps.find((step) => step.key === "manifest")?.faults[0]).toMatchObject({ place: name, expected: expect.stringMatching(/^[0-9a-f]{64}$/), found: expect.stringMatching(/^[0-9a-f]{64}$/) });
    expect(check(zip, testKey("stranger").id).status).toBe(1);
  });

  it("names a link and does not follow it", () => {
    const folder = path.join(work, "linked");
    writeBag(bag, folder);
    symlinkSync("/etc/hostname", path.join(folder, "data/link"));
    const { status, stdout } = check(folder);
    expect([status, stdout.includes("data/link: It is a link and not a file.")]).toEqual([1, true]);
  });

  it("finds an archive that was cut short", async () => {
    const whole = await zipBag(bag);
    for (const length of [whole.length - 1, whole.length - 40, 5000]) {
      writeFileSync(path.join(work, "short.zip"), whole.subarray(0, length));
      expect([length, check(path.join(work, "short.zip")).status]).toEqual([length, 1]);
    }
  });

  it("ends with 2 for what can't be checked, and says what to do", () => {
    writeFileSync(path.join(work, "letter.txt"), "Dear all");
    for (const [words, said] of [
      [[], "Name a bundle"], [[path.join(work, "nothing.zip")], "no such file"], [[path.join(work, "letter.txt")], "no ZIP archive"],
      [[zip, "abc"], "64 hex digits"], [[zip, "--fast"], "--fast"],
    ] as [string[], string][]) {
      const { status, stdout, stderr } = check(...words);
      expect([status, stdout, stderr.includes(said)]).toEqual([2, "", true]);
    }
    expect(check("--help")).toMatchObject({ status: 0 });
  });
});
