import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { expect, it, vi } from "vitest";

// the pool of this process works as the account that migrates, so that one transaction can hold the attack and the look at it
const accounts = vi.hoisted(() => {
  const { DATABASE_URL: appUrl = "", DATABASE_ADMIN_URL: adminUrl = "" } = process.env;
  process.env.DATABASE_URL = adminUrl;
  return { appUrl, adminUrl };
});

import { type BundleAgreement, bundleAttacks, compareChecks } from "@/scripts/tamper/bundles";
import { allCells } from "@/scripts/tamper/cells";
import { honestHouse } from "@/scripts/tamper/honest-logs";
import { falseAlarms } from "@/scripts/tamper/judge-house";
import { eightEntries, sweepLog, sweepSeal } from "@/scripts/tamper/log-flips";
import { isAsSaid, type Result, runMatrix } from "@/scripts/tamper/matrix";
import { matrixPage } from "@/scripts/tamper/page";
import { emptyHouse } from "../support/empty-house";

process.env.DATABASE_URL = accounts.appUrl;
vi.setConfig({ testTimeout: 3_600_000 });

// `npm run tamper:matrix`: every attack, every honest log, every flipped bit; writes docs/tamper-matrix.md
const HOUSES = 1_000;
const MUTANTS = "docs/tamper-mutants.md";
const say = (line: string) => process.stderr.write(`${line}\n`);
const found: { results: Result[]; agreements: BundleAgreement[]; honest: string[] } = { results: [], agreements: [], honest: [] };

it("raises no alarm over 1,000 honest workshops", async () => {
  const alarms: string[] = [];
  let [chains, entries, seals] = [0, 0, 0];
  for (let seed = 1; seed <= HOUSES; seed += 1) {
    const house = honestHouse(seed);
    alarms.push(...(await falseAlarms(house)).map((one) => `${seed}: ${one}`));
    chains += house.chains.size;
    seals += house.seals.length;
    for (const { lines } of house.chains.values()) entries += lines.length;
  }
  found.honest.push(`${HOUSES.toLocaleString("en")} random workshops with ${chains.toLocaleString("en")} logs, ${entries.toLocaleString("en")} entries and ${seals.toLocaleString("en")} seals (odd Unicode, clocks that step back, changes of both keys, heads turned back and gone on from): **${alarms.length} false alarms** of chain, keys and seals.`);
  expect(alarms).toEqual([]);
});

it("finds every flipped bit of a log and a seal and names its place first", async () => {
  const eight = eightEntries();
  const [log, seal] = [await sweepLog(eight, 1), await sweepSeal(eight, 1)];
  found.honest.push(`Each byte of each body, signature, key id, hash, link, number and head of a log of eight entries flipped: **${log.flips - log.missed.length} of ${log.flips.toLocaleString("en")}** found and the entry or head named first. Of a seal, its list of heads and what stands beside it: **${seal.flips - seal.missed.length} of ${seal.flips.toLocaleString("en")}**.`);
  expect([...log.missed, ...seal.missed]).toEqual([]);
});

it("notices every attack that docs/tamper-matrix.md says is noticed, and no other", async () => {
  await emptyHouse();
  const folder = mkdtempSync(path.join(os.tmpdir(), "twinread-tamper-"));
  try {
    const { results, scene } = await runMatrix(allCells(), accounts, folder, (n) => n % 50 === 0 && say(`${n} cells`));
    found.results = results;
    found.agreements = await compareChecks(scene, bundleAttacks());
  } finally {
    rmSync(folder, { recursive: true });
  }
  const mutants = existsSync(MUTANTS) ? readFileSync(MUTANTS, "utf8").replace(/^# .*\n+/, "") : "Not run yet.";
  writeFileSync("docs/tamper-matrix.md", matrixPage({ results: found.results, agreements: found.agreements, mutants, honest: found.honest.join("\n\n") }));
  expect(found.results.length).toBeGreaterThanOrEqual(250);
  expect(found.results.filter((one) => !isAsSaid(one)).map(({ cell, refused, outcome }) => [cell.attacker, cell.name, cell.row, refused, outcome])).toEqual([]);
  expect(found.agreements.filter((one) => one.page !== one.script)).toEqual([]);
  expect(found.agreements[0]).toMatchObject({ name: "nothing done", page: "in order" });
});
