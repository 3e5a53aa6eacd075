import { describe, expect, it } from "vitest";
import { appendEntry } from "@/lib/commands/append-entry";
import { createCase } from "@/lib/commands/create-case";
import { handOutImage } from "@/lib/commands/hand-out-image";
import { recordDrive } from "@/lib/commands/record-drive";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { revokeApproval } from "@/lib/commands/revoke-approval";
import { setReadAside } from "@/lib/commands/set-read-aside";
import { SYSTEM } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { checkCustody } from "@/lib/queries/custody";
import { Approval, Case, CustodyEntry, Drive, inTransaction, Read } from "@/models";
import { approve, freshImage, logOf, makeApprovedBench, makeChip, makeReady, makeReadyBench, makeUser, readsOf, store } from "../support/factory";
import { race, times } from "../support/race";
import { asAdmin } from "../support/tamper";

async function expectClean(driveId: string): Promise<void> {
  expect((await checkCustody(driveId)).findings).toEqual([]);
}

describe("several at once", () => {
  it("never approve one chip twice: 20 rounds of 8 leads", async () => {
    const technician = await makeUser("technician");
    const leads = [];
    for (let i = 0; i < 8; i += 1) leads.push(await makeUser("lead"));
    for (let round = 0; round < 20; round += 1) {
      const [chip, image] = [await makeChip(technician, { sizeBytes: 512 }), freshImage(512)];
      await makeReady(technician, chip, image);
      const { won, lost } = await race(leads.map((lead) => () => approve(lead, chip, image)));
      expect(won).toHaveLength(1);
      for (const error of lost) expect(error).toMatchObject({ code: "rule-against", detail: "An approval of this chip stands already. Revoke it before giving another." });
      const log = await logOf(chip.driveId);
      expect(log.filter((e) => e.action === "approval.given")).toHaveLength(1);
      expect(log.filter((e) => e.action === "approval.refused")).toHaveLength(7);
      expect(await Approval.count({ where: { chipId: chip.chipId } })).toBe(1);
      await expectClean(chip.driveId);
    }
  }, 120_000);

  it("never leave an approval standing on reads that are set aside", async () => {
    for (let round = 0; round < 6; round += 1) {
      const { technician, lead, chip, image } = await makeReadyBench();
      const [read] = await readsOf(technician, chip.chipId, "before");
      await race<unknown>([() => approve(lead, chip, image), () => setReadAside(technician, read.id, { reason: "The clip slipped." })]);
      expect(await Approval.count({ where: { chipId: chip.chipId, revokedAt: null } })).toBe(0);
    }
  }, 60_000);

  it("never hand out or record a write of an image after the entry that revokes it", async () => {
    for (let round = 0; round < 8; round += 1) {
      const { technician, lead, chip, approvalId } = await makeApprovedBench();
      const [read] = await readsOf(technician, chip.chipId, "before");
      await race<unknown>([
        () => revokeApproval(lead, approvalId, { reason: "Wrong board." }),
        ...times(3, () => () => handOutImage(technician, read.id, {})),
        () => recordTransfer(technician, approvalId, { kind: "write", donorChipId: chip.donorChipId }),
      ]);
      const actions = (await logOf(chip.driveId)).map((e) => e.action);
      const revoked = actions.indexOf("approval.revoked");
      expect(revoked).toBeGreaterThan(0);
      expect(actions.slice(revoked).filter((a) => a === "image.handed-out" || a === "transfer.recorded")).toEqual([]);
    }
  }, 60_000);

  it("revoke an approval once", async () => {
    const { lead, chip, approvalId } = await makeApprovedBench();
    const { won } = await race(times(8, () => () => revokeApproval(lead, approvalId, { reason: "Wrong board." })));
    expect(won).toHaveLength(1);
    expect((await logOf(chip.driveId)).filter((e) => e.action === "approval.revoked")).toHaveLength(1);
  });

  it("wait for one drive without starving whoever works on it", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician, { sizeBytes: 512 });
    await store(technician, chip.chipId, "before", freshImage(512), 1);
    const { won, lost } = await asAdmin(async (db) => {
      await db.beginTransaction();
      await db.query("SELECT seq FROM custody_heads WHERE chain_id = ? FOR UPDATE", [chip.driveId]);
      const waiting = race(times(20, () => () => store(technician, chip.chipId, "before", freshImage(512), 1)));
      await new Promise((done) => setTimeout(done, 1500));
      await db.commit();
      return waiting;
    });
    expect(lost).toEqual([]);
    expect(won).toHaveLength(20);
  }, 60_000);

  it("append to one drive and leave one chain: 32 at once", async () => {
    const technician = await makeUser("technician");
    const { driveId } = await makeChip(technician);
    const before = (await checkCustody(driveId)).entries;
    const { lost } = await race(times(32, (i) => () => inTransaction((tx) => appendEntry(tx, driveId, SYSTEM, "log.assessed", { type: "drive", id: driveId }, { text: `Line ${i} of many` }))));
    expect(lost).toEqual([]);
    const check = await checkCustody(driveId);
    expect(check.findings).toEqual([]);
    expect(check.entries).toBe(before + 32);
    const rows = await CustodyEntry.findAll({ where: { chainId: driveId }, order: ["seq"] });
    expect(new Set(rows.map((r) => r.prev.toString("hex"))).size).toBe(rows.length);
  });

  it("take case numbers and drive letters, each once and without a gap", async () => {
    const technician = await makeUser("technician");
    const customer = { name: "Fenwick Survey", email: "desk@fenwick.example" };
    const { won } = await race(times(12, () => () => createCase(technician, { customer, damage: "Surge" })));
    const numbers = won.map(({ ref }) => Number(ref.slice(3))).sort((a, b) => a - b);
    expect(numbers).toEqual(times(12, (i) => numbers[0] + i));
    expect(await Case.count({ where: { ref: won.map(({ ref }) => ref) } })).toBe(12);
    const drives = await race(times(8, (i) => () => recordDrive(technician, won[0].id, { serial: `SN-RACE-${i}` })));
    expect(drives.won.map((d) => d.letter).sort()).toEqual(["A", "B", "C", "D", "E", "F", "G", "H"]);
    expect(await Drive.count({ where: { caseId: won[0].id } })).toBe(8);
  });
});

it("what is refused rolls back whole: a read that cannot be logged is not stored", async () => {
  const technician = await makeUser("technician");
  const chip = await makeChip(technician);
  const before = (await logOf(chip.driveId)).length;
  await expect(inTransaction(async (tx) => {
    await appendEntry(tx, chip.driveId, SYSTEM, "log.assessed", { type: "drive", id: chip.driveId }, { text: "Never to be seen" });
    throw new AppError("rule-against", "stop");
  })).rejects.toThrow("stop");
  // a lone surrogate is no evidence: the entry is refused, and with it the read
  await expect(store(technician, chip.chipId, "before", freshImage(), 1, {}, "bad-\ud800.bin")).rejects.toThrow();
  expect(await Read.count({ where: { chipId: chip.chipId } })).toBe(0);
  expect((await logOf(chip.driveId)).length).toBe(before);
  await expectClean(chip.driveId);
});
