import { createHash, generateKeyPairSync, sign } from "node:crypto";
import { QueryTypes } from "sequelize";
import { describe, expect, it } from "vitest";
import { appendEntry } from "@/lib/commands/append-entry";
import { assessLog } from "@/lib/commands/assess-log";
import { correctDrive } from "@/lib/commands/correct-drive";
import { openHandedOut } from "@/lib/commands/hand-out-image";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { canonicalJson } from "@/lib/core/canonical";
import { signedBytes } from "@/lib/core/custody";
import { checkCustody, custodyCheckOfDrive } from "@/lib/queries/custody";
import { connection, CustodyEntry, CustodyHead, inTransaction } from "@/models";
import { checkDatabase } from "@/models/check-database";
import { keyIdOf } from "@/storage";
import { logged, readNamed, refusal } from "../support/bench-steps";
import { approve, type Bench, makeApprovedBench, makeReadyBench, makeUser, stateOf } from "../support/factory";
import { changeBody, withoutTriggers } from "../support/tamper";

const problems = async (chain: string) => (await checkCustody(chain)).findings.map((f) => `${f.seq ?? "head"}: ${f.problem}`);
const lastSeq = async (chain: string) => (await CustodyHead.findByPk(chain))!.seq;
const closed = { status: 409, detail: expect.stringContaining("until an auditor has recorded an assessment") as string };
const TEXT = { text: "Looked at entry and backup: one byte differs, the facts are known." };

/** As the app's own database user, past all commands. */
const raw = (statement: string) => connection().query(statement);

describe("the app's database user", () => {
  it("cannot change, remove, empty or drop the log, nor put a trigger on it", async () => {
    const { chip } = await makeReadyBench();
    const before = (await checkCustody(chip.driveId)).head;
    for (const statement of [
      `UPDATE custody_entries SET action = 'x' WHERE chain_id = '${chip.driveId}'`,
      `DELETE FROM custody_entries WHERE chain_id = '${chip.driveId}'`,
      `DELETE FROM custody_heads WHERE chain_id = '${chip.driveId}'`,
      "TRUNCATE TABLE custody_entries",
      "DROP TABLE custody_entries",
      "ALTER TABLE custody_entries DROP COLUMN action",
      "DROP TRIGGER custody_entries_no_update",
      "CREATE TRIGGER sneak BEFORE INSERT ON custody_entries FOR EACH ROW SET NEW.action = 'x'",
    ]) await expect(raw(statement), statement).rejects.toThrow(/denied|append-only/);
    expect(await checkCustody(chip.driveId)).toMatchObject({ ok: true, head: before });
    await checkDatabase();
  });

  it("cannot turn the head of a chain back, nor move it past the last entry", async () => {
    const { chip } = await makeReadyBench();
    for (const step of ["seq - 1", "seq + 2", "seq"]) {
      await expect(raw(`UPDATE custody_heads SET seq = ${step} WHERE chain_id = '${chip.driveId}'`), step).rejects.toThrow("only moves forward");
    }
  });

  it("cannot change what was read, approved or transferred", async () => {
    const { chip } = await makeApprovedBench();
    for (const statement of [
      `UPDATE \`reads\` SET sha256 = UNHEX(REPEAT('0', 64)) WHERE chip_id = '${chip.chipId}'`,
      `DELETE FROM \`reads\` WHERE chip_id = '${chip.chipId}'`,
      `UPDATE approvals SET sha256 = UNHEX(REPEAT('0', 64)) WHERE chip_id = '${chip.chipId}'`,
      `DELETE FROM approvals WHERE chip_id = '${chip.chipId}'`,
      "DELETE FROM transfers", "DELETE FROM images", "UPDATE images SET size_bytes = 1",
    ]) await expect(raw(statement), statement).rejects.toThrow(/denied/);
  });
});

/** An entry whose chain is right, put in by somebody who does not have the log key. */
async function forge(chain: string, action: string, facts: object): Promise<number> {
  const { privateKey, publicKey } = generateKeyPairSync("ed25519");
  const head = (await CustodyHead.findByPk(chain))!;
  const seq = head.seq + 1;
  const actor = { id: "7d4b7a9e-3f0f-4bd0-9c55-1f1d0f5d8a11", name: "Somebody", role: "auditor" };
  const body = Buffer.from(canonicalJson({ v: 1, drive: chain, seq, at: head.at, app: "1.0.0", actor, action, subject: { type: "drive", id: chain }, facts, prev: head.hash.toString("hex") }));
  const hash = createHash("sha256").update(body).digest();
  await CustodyEntry.create({ chainId: chain, seq, body, hash, prev: head.hash, keyId: keyIdOf(publicKey), signature: sign(null, signedBytes(body), privateKey), action });
  await CustodyHead.update({ seq, hash }, { where: { chainId: chain } });
  return seq;
}

describe("a forged entry with a right chain", () => {
  it("is found by its foreign key, and closes the drive", async () => {
    const bench = await makeReadyBench();
    const seq = await forge(bench.chip.driveId, "drive.corrected", { changes: [], reason: "None." });
    expect(await problems(bench.chip.driveId)).toEqual([`${seq}: unknown-key`]);
    expect((await refusal(approve(bench.lead, bench.chip, bench.image))).detail).toBe("The check of this drive’s custody log is not clean. An auditor records an assessment first.");
  });

  it("is found when it borrows the id of the real key", async () => {
    const bench = await makeReadyBench();
    const seq = await forge(bench.chip.driveId, "drive.corrected", { changes: [], reason: "None." });
    const { keyId } = (await CustodyEntry.findOne({ where: { chainId: bench.chip.driveId, seq: 1 } }))!;
    await withoutTriggers(["custody_entries"], (db) => db.query("UPDATE custody_entries SET key_id = ? WHERE chain_id = ? AND seq = ?", [keyId, bench.chip.driveId, seq]));
    expect(await problems(bench.chip.driveId)).toEqual([`${seq}: signature`]);
  });

  it("does not pass for an auditor's assessment", async () => {
    const bench = await makeReadyBench();
    const undo = await changeBody(bench.chip.driveId, 2, (body) => Buffer.from(body.toString("utf8").replace("rev C", "rev D")));
    await forge(bench.chip.driveId, "log.assessed", TEXT);
    expect(await refusal(openHandedOut(bench.lead, (await readNamed(bench, "before", 1)).id, { reason: "To look at it." }))).toMatchObject(closed);
    await undo();
  });
});

/** What a log that does not check out closes: approval, hand-out, transfer. */
async function expectClosed(bench: Bench, approvalId: string | null): Promise<void> {
  const { id } = await readNamed(bench, "before", 1);
  expect(await refusal(openHandedOut(bench.lead, id, { reason: "To look at it." }))).toMatchObject(closed);
  if (approvalId) expect(await refusal(recordTransfer(bench.technician, approvalId, { kind: "write", donorChipId: bench.chip.donorChipId }))).toMatchObject(closed);
  else expect(await refusal(approve(bench.lead, bench.chip, bench.image))).toMatchObject({ status: 409, detail: expect.stringContaining("custody log is not clean") as string });
}

describe("a body that was changed behind the log's back", () => {
  const edit = (body: Buffer) => Buffer.from(body.toString("utf8").replace(/"name":"Person (\d+)"/, '"name":"Parson $1"'));

  it("is found at the entry and at the next one, in the check that people see too", async () => {
    const bench = await makeReadyBench();
    const undo = await changeBody(bench.chip.driveId, 3, edit);
    expect(await problems(bench.chip.driveId)).toEqual(["3: stored-hash", "3: signature", "4: prev"]);
    expect(await custodyCheckOfDrive(await makeUser("auditor"), bench.chip.driveId)).toMatchObject({ ok: false });
    await undo();
    expect(await problems(bench.chip.driveId)).toEqual([]);
  });

  it("closes approval and hand-out until an auditor's assessment; reads and corrections go on", async () => {
    const bench = await makeReadyBench();
    await changeBody(bench.chip.driveId, 3, edit);
    await expectClosed(bench, null);
    await correctDrive(bench.technician, bench.chip.driveId, { changes: { interface: "SATA" }, reason: "It says so on the label." });
    for (const role of ["technician", "lead", "admin"] as const) expect(await refusal(assessLog(await makeUser(role), bench.chip.driveId, TEXT))).toMatchObject({ status: 403 });
    await assessLog(await makeUser("auditor"), bench.chip.driveId, TEXT);
    await approve(bench.lead, bench.chip, bench.image);
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("approved");
    await openHandedOut(bench.technician, (await readNamed(bench, "before", 1)).id, {});
  });

  it("closes a transfer, and closes again for damage that came after the assessment", async () => {
    const bench = await makeApprovedBench();
    await changeBody(bench.chip.driveId, 3, edit);
    await expectClosed(bench, bench.approvalId);
    await assessLog(await makeUser("auditor"), bench.chip.driveId, TEXT);
    await correctDrive(bench.technician, bench.chip.driveId, { changes: { interface: "SATA" }, reason: "It says so on the label." });
    await changeBody(bench.chip.driveId, await lastSeq(bench.chip.driveId), edit);
    await expectClosed(bench, bench.approvalId);
    await assessLog(await makeUser("auditor"), bench.chip.driveId, TEXT);
    await recordTransfer(bench.technician, bench.approvalId, { kind: "write", donorChipId: bench.chip.donorChipId });
  });

  it("opens with one assessment, also when it is the very last entry that was changed", async () => {
    const bench = await makeReadyBench();
    await changeBody(bench.chip.driveId, await lastSeq(bench.chip.driveId), (body) => Buffer.concat([body, Buffer.from(" ")]));
    expect(await refusal(openHandedOut(bench.lead, (await readNamed(bench, "before", 1)).id, { reason: "To look at it." }))).toMatchObject(closed);
    await assessLog(await makeUser("auditor"), bench.chip.driveId, TEXT);
    await openHandedOut(bench.lead, (await readNamed(bench, "before", 1)).id, { reason: "To look at it." });
  });

  it("does not open because another entry is labelled an assessment", async () => {
    const bench = await makeReadyBench();
    await changeBody(bench.chip.driveId, 2, edit);
    const last = await lastSeq(bench.chip.driveId);
    await withoutTriggers(["custody_entries"], (db) => db.query("UPDATE custody_entries SET action = 'log.assessed' WHERE chain_id = ? AND seq = ?", [bench.chip.driveId, last]));
    await expectClosed(bench, null);
  });
});

describe("a chain that was cut or turned back", () => {
  it("is found when its last entries are gone, also on a drive that was assessed before", async () => {
    const bench = await makeReadyBench();
    await assessLog(await makeUser("auditor"), bench.chip.driveId, TEXT);
    await correctDrive(bench.technician, bench.chip.driveId, { changes: { interface: "SATA" }, reason: "It says so on the label." });
    const last = await lastSeq(bench.chip.driveId);
    await withoutTriggers(["custody_entries"], (db) => db.query("DELETE FROM custody_entries WHERE chain_id = ? AND seq = ?", [bench.chip.driveId, last]));
    expect(await problems(bench.chip.driveId)).toEqual(["head: tail-missing"]);
    await expectClosed(bench, null);
    await assessLog(await makeUser("auditor"), bench.chip.driveId, TEXT);
    await approve(bench.lead, bench.chip, bench.image);
  });

  it("goes on after the last entry when its head is turned back, says so for good, and approves nothing until that is assessed", async () => {
    const bench = await makeReadyBench();
    const last = await lastSeq(bench.chip.driveId);
    const { prev } = (await CustodyEntry.findOne({ where: { chainId: bench.chip.driveId, seq: last } }))!;
    await withoutTriggers(["custody_heads"], (db) => db.query("UPDATE custody_heads SET seq = ?, hash = ? WHERE chain_id = ?", [last - 1, prev, bench.chip.driveId]));
    expect(await problems(bench.chip.driveId)).toEqual(["head: head"]);
    await correctDrive(bench.technician, bench.chip.driveId, { changes: { interface: "SATA" }, reason: "It says so." });
    expect((await logged(bench.chip.driveId, "drive.corrected"))[0].headBehind).toBe(last - 1);
    expect(await problems(bench.chip.driveId)).toEqual([`${last + 1}: head-was-behind`]);
    await expectClosed(bench, null);
    await assessLog(await makeUser("auditor"), bench.chip.driveId, TEXT);
    await approve(bench.lead, bench.chip, bench.image);
  });

  it("goes on behind a stranger's row that carries the hash of an earlier entry", async () => {
    const { technician, chip } = await makeReadyBench();
    const rows = await CustodyEntry.findAll({ where: { chainId: chip.driveId }, order: ["seq"] });
    const last = rows.at(-1)!;
    await CustodyEntry.create({ chainId: chip.driveId, seq: last.seq + 1, body: Buffer.from("{}"), hash: rows[1].prev, prev: last.hash, keyId: last.keyId, signature: last.signature, action: "drive.corrected" });
    await correctDrive(technician, chip.driveId, { changes: { interface: "SATA" }, reason: "It says so." });
    const found = await problems(chip.driveId);
    expect(found).toContain(`${last.seq + 1}: signature`);
    expect(found).toContain(`${last.seq + 2}: head-was-behind`);
  });

  it("goes on when its head is gone", async () => {
    const { technician, chip } = await makeReadyBench();
    const last = await lastSeq(chip.driveId);
    await withoutTriggers(["custody_heads"], (db) => db.query("DELETE FROM custody_heads WHERE chain_id = ?", [chip.driveId]));
    expect(await problems(chip.driveId)).toEqual(["head: head"]);
    await correctDrive(technician, chip.driveId, { changes: { interface: "SATA" }, reason: "It says so." });
    expect(await problems(chip.driveId)).toEqual([`${last + 1}: head-was-behind`]);
  });

  it("is found when an entry in the middle is gone", async () => {
    const bench = await makeReadyBench();
    await withoutTriggers(["custody_entries"], (db) => db.query("DELETE FROM custody_entries WHERE chain_id = ? AND seq = 4", [bench.chip.driveId]));
    expect(await problems(bench.chip.driveId)).toEqual(["5: sequence", "5: prev"]);
  });
});

describe("a clock that went back", () => {
  it("keeps the time of the entry before and says by how much", async () => {
    const { technician, chip } = await makeReadyBench();
    await inTransaction(async (tx) => {
      await connection().query("SET timestamp = UNIX_TIMESTAMP() - 3600", { transaction: tx });
      try {
        await appendEntry(tx, chip.driveId, technician, "drive.corrected", { type: "drive", id: chip.driveId }, { changes: [{ field: "interface", from: null, to: "SATA" }], reason: "It says so." });
      } finally {
        await connection().query("SET timestamp = DEFAULT", { transaction: tx });
      }
    });
    const [behind] = await logged(chip.driveId, "drive.corrected");
    expect(behind.clockBehindMs).toBeGreaterThan(3_590_000);
    expect(behind.clockBehindMs).toBeLessThan(3_660_000);
    expect(await problems(chip.driveId)).toEqual([]);
    const rows = await CustodyEntry.findAll({ where: { chainId: chip.driveId }, order: ["seq"] });
    const [former, last] = rows.slice(-2).map((row) => (JSON.parse(row.body.toString("utf8")) as { at: string }).at);
    expect(last).toBe(former);
  });

  it("leaves no other connection with a wrong clock", async () => {
    const times = await Promise.all(Array.from({ length: 12 }, () => connection().query<{ s: number }>("SELECT ABS(UNIX_TIMESTAMP() - UNIX_TIMESTAMP(SYSDATE())) AS s", { type: QueryTypes.SELECT })));
    expect(times.flat().every((row) => row.s < 5)).toBe(true);
  });
});
