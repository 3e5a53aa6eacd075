import { appendFileSync, existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, statSync, truncateSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { makeSeal } from "@/lib/commands/make-seal";
import { witnessSeals } from "@/lib/commands/witness-seals";
import { canonicalJson } from "@/lib/core/canonical";
import { parseSeal, sealText } from "@/lib/core/seal";
import { SYSTEM } from "@/lib/core/words";
import { env } from "@/lib/env";
import { newestSeal } from "@/lib/queries/seals";
import { witnessState } from "@/lib/queries/witness";
import { inTransaction, Seal } from "@/models";
import { makeUser } from "../support/factory";
import { times } from "../support/race";

const work = mkdtempSync(path.join(os.tmpdir(), "twinread-witness-"));
const own = env().witnessFile;
let file = "";
let n = 0;

beforeAll(async () => {
  await makeUser("auditor");
  await makeSeal(SYSTEM, "bundle");
});
beforeEach(() => {
  file = path.join(work, `${(n += 1)}`, "seals.jsonl");
  mkdirSync(path.dirname(file));
  Object.assign(env(), { witnessFile: file });
});
afterAll(async () => {
  await witnessSeals();
  Object.assign(env(), { witnessFile: own });
  rmSync(work, { recursive: true, force: true });
});

interface Line {
  keyId: string;
  seal: string;
  signature: string;
}
const lines = () => readFileSync(file, "utf8").split("\n").slice(0, -1).map((line) => JSON.parse(line) as Line);
const numbers = () => lines().map((line) => parseSeal(line.seal)!.number);
const newest = async () => (await newestSeal())!.number;

describe("the witness file", () => {
  it("gets every seal that there is, one canonical line each, and then each new one", async () => {
    await witnessSeals();
    expect(numbers()).toEqual(times(await newest(), (i) => i + 1));
    const seal = await makeSeal(SYSTEM, "bundle");
    await witnessSeals();
    expect(lines().at(-1)).toEqual({ keyId: seal.keyId, seal: seal.text, signature: seal.signature });
    for (const line of readFileSync(file, "utf8").split("\n").slice(0, -1)) expect(canonicalJson(JSON.parse(line))).toBe(line);
    expect(statSync(file).mode & 0o777).toBe(0o600);
    expect(await witnessState()).toEqual({ path: file, last: seal.number, trouble: null });
  });

  it("is only ever added to: what stands in it stays byte for byte, and nothing is written twice", async () => {
    await witnessSeals();
    const before = readFileSync(file);
    await Promise.all(times(5, () => witnessSeals()));
    expect(readFileSync(file).equals(before)).toBe(true);
    await Promise.all(times(4, () => makeSeal(SYSTEM, "bundle")));
    await Promise.all(times(3, () => witnessSeals()));
    expect(readFileSync(file).subarray(0, before.length).equals(before)).toBe(true);
    expect(numbers()).toEqual(times(await newest(), (i) => i + 1));
  });

  it("holds no seal whose transaction did not end", async () => {
    await witnessSeals();
    const before = readFileSync(file);
    await expect(inTransaction(async (tx) => {
      await makeSeal(SYSTEM, "bundle", tx);
      throw new Error("power cut");
    })).rejects.toThrow();
    await witnessSeals();
    expect(readFileSync(file).equals(before)).toBe(true);
  });

  it("that can't be written stops no seal, is said, and catches up by itself", async () => {
    rmSync(path.dirname(file), { recursive: true });
    const seal = await makeSeal(SYSTEM, "bundle");
    await witnessSeals();
    expect(existsSync(file)).toBe(false);
    expect(await witnessState()).toMatchObject({ last: null, trouble: expect.stringContaining("its folder is not there") as string });
    expect((await witnessState()).trouble).toMatch(/^The witness file can't be written: .*\.$/);
    writeFileSync(path.dirname(file), "a file where the folder should be");
    await witnessSeals();
    expect((await witnessState()).trouble).toMatch(/^The witness file can't be (written|read): .*\.$/);
    rmSync(path.dirname(file));
    mkdirSync(path.dirname(file));
    await witnessSeals();
    expect(await witnessState()).toEqual({ path: file, last: seal.number, trouble: null });
    expect(numbers()).toEqual(times(seal.number, (i) => i + 1));
  });

  it("goes on after a line that a dying writer left half", async () => {
    await witnessSeals();
    const before = numbers();
    truncateSync(file, statSync(file).size - 40);
    await witnessSeals();
    expect(numbers()).toEqual(before);
    // with nothing but the newline gone the seal counts as there
    truncateSync(file, statSync(file).size - 1);
    await makeSeal(SYSTEM, "bundle");
    await witnessSeals();
    expect(numbers()).toEqual(times(await newest(), (i) => i + 1));
    expect((await witnessState()).trouble).toBeNull();
  });

  it("says when somebody wrote into it, and leaves that in", async () => {
    await witnessSeals();
    appendFileSync(file, "not a seal");
    await makeSeal(SYSTEM, "bundle");
    await witnessSeals();
    expect(readFileSync(file, "utf8")).toContain("}\nnot a seal\n{");
    expect((await witnessState()).trouble).toContain("1 line of the witness file is no seal");
  });

  it("says when it holds a seal that the database does not have: the database was turned back", async () => {
    await witnessSeals();
    const row = (await Seal.findOne({ order: [["number", "DESC"]] }))!;
    const gone = sealText({ ...parseSeal(row.text.toString("utf8"))!, number: row.number + 1, prev: row.sha256.toString("hex") });
    appendFileSync(file, `${canonicalJson({ keyId: row.keyId, seal: gone, signature: row.signature.toString("base64") })}\n`);
    expect((await witnessState()).trouble).toContain(`The witness file holds seal ${row.number + 1} that the database doesn't have`);
    const { number } = await makeSeal(SYSTEM, "bundle");
    await witnessSeals();
    expect(numbers().slice(-2)).toEqual([number, number]);
    expect((await witnessState()).trouble).toContain("turned back");
  });

  it("makes its folder in the data folder, and nowhere else", async () => {
    Object.assign(env(), { witnessFile: own });
    rmSync(path.dirname(own), { recursive: true, force: true });
    await witnessSeals();
    expect(await witnessState()).toEqual({ path: own, last: await newest(), trouble: null });
  });
});
