import { execFileSync } from "node:child_process";
import { createHash } from "node:crypto";
import { existsSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import path from "node:path";
import { expect } from "@playwright/test";
import type { CustodyCheckView, DriveProofView, KeyRow, ListView, SealRow, SealView } from "@/lib/views";
import { dataFolder } from "./support/accounts";
import { custodyOf, makePair, randomImage, store } from "./support/bench";
import { newFolder } from "./support/files";
import { mailsTo } from "./support/mails";
import { makeNewcomerToken } from "./support/newcomers";
import { call, done, expectProblem, tokenOf } from "./support/station";
import { test } from "./support/test";

let mira: string;
let ines: string;
let odile: string;
test.beforeAll(async () => {
  [mira, ines, odile] = await Promise.all([tokenOf("mira"), tokenOf("ines"), tokenOf("odile")]);
});

interface Made {
  number: number;
  text: string;
  sha256: string;
}
const ask = () => done<Made>("POST", "/api/seals", { token: ines });

/** Downloads the three files of a seal and lets openssl judge. */
async function verified(number: number): Promise<string> {
  const folder = newFolder();
  for (const [file, name] of [["text", "seal.txt"], ["signature", "seal.sig"], ["key", "seal-key.pem"]]) {
    const answer = await call("GET", `/api/seals/${number}?file=${file}`, { token: ines });
    expect(answer.headers.get("content-disposition")).toBe(`attachment; filename="${name}"`);
    writeFileSync(path.join(folder, name), answer.bytes);
  }
  return execFileSync("openssl", ["pkeyutl", "-verify", "-pubin", "-inkey", "seal-key.pem", "-rawin", "-in", "seal.txt", "-sigfile", "seal.sig"], { cwd: folder, encoding: "utf8" });
}

test("the day's seal is made by the start, and each seal follows the one before", async () => {
  await expect.poll(async () => (await done<ListView<SealRow>>("GET", "/api/seals?pageSize=200", { token: ines })).items.filter((seal) => seal.cause === "daily").length).toBeGreaterThan(0);
  await ask();
  const { items } = await done<ListView<SealRow>>("GET", "/api/seals?pageSize=200", { token: ines });
  items.slice(1).forEach((earlier, i) => expect(items[i]).toMatchObject({ number: earlier.number + 1, prev: earlier.sha256 }));
});

test("a seal that was asked for is accepted by openssl, proves a drive, reaches auditors and the witness file", async () => {
  const auditor = await makeNewcomerToken("auditor");
  const pair = await makePair(mira, { customer: "Sealed", sizeBytes: 512 });
  await store(mira, pair.chipId, "before", 1, [randomImage(512)]);
  const seal = await ask();
  expect(await verified(seal.number)).toContain("Verified Successfully");
  const { proof } = await done<DriveProofView>("GET", `/api/drives/${pair.driveId}/proof?seal=${seal.number}`, { token: mira });
  const last = (await custodyOf(mira, pair.driveId)).at(-1)!;
  expect(proof.proofs[0]).toMatchObject({ drive: pair.driveId, head: createHash("sha256").update(last.body).digest("hex") });
  // a header of more than 76 characters is folded
  const withSeal = () => mailsTo(auditor.email).filter((mail) => mail.replace(/\r?\n[ \t]/g, " ").includes(`X-Twinread-Seal: ${seal.number} ${seal.sha256}`) && mail.replaceAll("\r\n", "\n").includes(seal.text));
  await expect.poll(() => withSeal().length, { timeout: 20_000 }).toBe(1);
  const file = path.join(dataFolder(), "witness/seals.jsonl");
  await expect.poll(() => existsSync(file) && readFileSync(file, "utf8").includes(JSON.stringify(seal.text))).toBe(true);
  expectProblem(await call("POST", "/api/seals", { token: mira }), 403, /\.$/);
});

test("after a change of both keys old and new entries and seals hold, and the former private keys are gone", async () => {
  const pair = await makePair(mira, { customer: "New keys", sizeBytes: 512 });
  const before = await ask();
  for (const purpose of ["log", "seal"]) await done("POST", "/api/keys", { token: odile, json: { purpose, reason: "Tried by the browser tests." } });
  await store(mira, pair.chipId, "before", 1, [randomImage(512)]);
  const after = await ask();
  for (const { number } of [before, after]) expect(await verified(number)).toContain("Verified Successfully");
  const [one, two] = await Promise.all([before, after].map(({ number }) => done<SealView>("GET", `/api/seals/${number}`, { token: ines })));
  expect(two.keyId).not.toBe(one.keyId);
  expect(await done<CustodyCheckView>("GET", `/api/drives/${pair.driveId}/custody/check`, { token: mira })).toMatchObject({ ok: true });
  const { keys } = await done<{ keys: KeyRow[] }>("GET", "/api/keys", { token: ines });
  const current = keys.filter((key) => key.current).map((key) => key.keyId);
  expect(current).toHaveLength(2);
  expect(readdirSync(path.join(dataFolder(), "keys")).filter((name) => name.includes("next"))).toEqual([]);
  const old = readdirSync(path.join(dataFolder(), "keys/old")).map((name) => name.replace(".pub.pem", ""));
  expect(old.sort()).toEqual(keys.filter((key) => !key.current).map((key) => key.keyId).sort());
  expectProblem(await call("POST", "/api/keys", { token: ines, json: { purpose: "log", reason: "Not for a lead." } }), 403, /\.$/);
});
