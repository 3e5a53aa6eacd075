import { chmodSync, readFileSync, renameSync, writeFileSync } from "node:fs";
import path from "node:path";
import { expect } from "@playwright/test";
import { dataFolder } from "./support/accounts";
import { approve, chipOf, custodyOf, makeReady, type Ready, store } from "./support/bench";
import { asAdmin, rewriteBody } from "./support/database";
import { checkStore } from "./support/second-server";
import { call, done, expectProblem, tokenOf } from "./support/station";
import { test } from "./support/test";

let mira: string;
let ines: string;
test.beforeAll(async () => {
  [mira, ines] = await Promise.all([tokenOf("mira"), tokenOf("ines")]);
});

const imageFile = (sha256: string) => path.join(dataFolder(), "images/sha256", sha256.slice(0, 2), sha256);
const handOut = (token: string, readId: string) => call("POST", `/api/reads/${readId}/download`, { token, json: { reason: "To write it to the donor." } });

/** One bit of a stored image, as a failing disk would; gives back how to undo it. */
function flipBit(sha256: string): () => void {
  const file = imageFile(sha256);
  const before = readFileSync(file);
  const after = Buffer.from(before);
  after[1234] ^= 0x10;
  chmodSync(file, 0o640);
  writeFileSync(file, after);
  return () => {
    writeFileSync(file, before);
    chmodSync(file, 0o440);
  };
}

function takeAway(sha256: string): () => void {
  const file = imageFile(sha256);
  renameSync(file, `${file}-away`);
  return () => renameSync(`${file}-away`, file);
}

async function approved(customer: string): Promise<Ready & { approvalId: string }> {
  const chip = await makeReady(mira, { customer, sizeBytes: 8192 });
  const answer = await approve(ines, chip, chip.sha256);
  expect(answer.status).toBe(201);
  return { ...chip, approvalId: answer.json<{ id: string }>().id };
}

const transfer = (chip: Ready & { approvalId: string }) =>
  call("POST", `/api/approvals/${chip.approvalId}/transfer`, { token: mira, json: { kind: "write", donorChipId: chip.donorChipId } });

for (const { what, spoil, problem, word } of [
  { what: "one changed bit in a stored image", spoil: flipBit, problem: "image-damaged", word: "damaged" },
  { what: "a stored image that is gone", spoil: takeAway, problem: "image-missing", word: "missing" },
]) {
  test(`${what} is named by the check, keeps the image in the house, and brings its approval down`, async () => {
    const chip = await approved("Damaged store");
    const undo = spoil(chip.sha256);
    try {
      const report = await checkStore({ withPage: spoil === flipBit });
      expect(report.code).toBe(1);
      const found = report.damage.filter((damage) => damage.problem === problem);
      expect(found).toHaveLength(1);
      expect(found[0].sha256).toBe(chip.sha256);
      expect(found[0].reads).toHaveLength(3);
      expect(found[0].reads).toContainEqual(expect.stringMatching(/^Case \d\d-\d{4}, Drive A, Orig U7, Read 2$/));
      if (spoil === flipBit) expect(report.page).toContain(`Image ${chip.sha256}`);
      for (const token of [mira, ines]) expectProblem(await handOut(token, chip.reads[0].id), 409, new RegExp(`is ${word}: it no longer matches its digest\\. Nothing was done with it\\.`));
      const after = await chipOf(mira, chip.chipId);
      expect(after.state).not.toBe("approved");
      expectProblem(await transfer(chip), 409, /revoked/);
      const actions = (await custodyOf(mira, chip.driveId)).map((entry) => entry.action);
      expect(actions).toContain("image.found-damaged");
      expect(actions).toContain("approval.revoked");
      expect(actions).not.toContain("image.handed-out");
    } finally {
      undo();
    }
    expect((await checkStore()).code).toBe(0);
    expect((await handOut(ines, chip.reads[0].id)).status).toBe(200);
  });
}

test("one changed letter in a log's entry is named by the check and closes approval, hand-out and transfer until it is back", async () => {
  const chip = await approved("Rewritten log");
  const entries = await custodyOf(mira, chip.driveId);
  const { seq } = entries.find((entry) => entry.action === "read.stored")!;
  // a forger takes care that the body stays canonical JSON
  const body = await rewriteBody(chip.driveId, seq, (text) => Buffer.from(text.toString("utf8").replace('"reader":"R2"', '"reader":"R3"')));
  try {
    const report = await checkStore({ withPage: true });
    expect(report.code).toBe(1);
    expect(report.damage.map((damage) => damage.seq)).toEqual(expect.arrayContaining([seq]));
    for (const damage of report.damage) {
      // the log itself, or the read that its entry tells of
      expect(damage.place).toMatch(/^Case \d\d-\d{4}, Drive A(, Donor U\d+, Own 1)?$/);
      expect([seq, seq + 1]).toContain(damage.seq);
    }
    expect(report.page).toMatch(new RegExp(`Drive A, entry ${seq}: `));
    const check = await done<{ ok: boolean; findings: { seq: number | null }[] }>("GET", `/api/drives/${chip.driveId}/custody/check`, { token: mira });
    expect(check.ok).toBe(false);
    expect(check.findings.map((finding) => finding.seq)).toContain(seq);
    expectProblem(await handOut(mira, chip.reads[0].id), 409, /custody log of this drive doesn't check out/);
    expectProblem(await handOut(ines, chip.reads[0].id), 409, /doesn't check out/);
    expectProblem(await transfer(chip), 409, /doesn't check out/);
    // appending goes on: a read is still stored
    await store(mira, chip.chipId, "before", 3, [chip.image]);
  } finally {
    await rewriteBody(chip.driveId, seq, () => body);
  }
  expect((await checkStore()).code).toBe(0);
  expect(await done("GET", `/api/drives/${chip.driveId}/custody/check`, { token: mira })).toMatchObject({ ok: true, findings: [] });
  expect((await handOut(mira, chip.reads[0].id)).status).toBe(200);
  expect((await transfer(chip)).status).toBe(201);
});

test("the log's own refusal stands again after the tests had put it aside", async () => {
  const [entry] = await custodyOf(mira, (await makeReady(mira, { customer: "Append-only", sizeBytes: 64 })).driveId);
  await asAdmin(async (db) => {
    for (const sql of ["UPDATE custody_entries SET action = action WHERE seq = ?", "DELETE FROM custody_entries WHERE seq = ?"]) {
      await expect(db.query(sql, [entry.seq])).rejects.toThrow(/the custody log is append-only/);
    }
  });
});
