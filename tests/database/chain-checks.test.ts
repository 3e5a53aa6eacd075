import { Op } from "sequelize";
import { describe, expect, it } from "vitest";
import { checkChains } from "@/lib/commands/check-chains";
import { recordBoard } from "@/lib/commands/record-board";
import { recordChainCheck } from "@/lib/commands/record-chain-check";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { checkChain } from "@/lib/commands/check-chain";
import { checkCustody, custodyCheckOfDrive } from "@/lib/queries/custody";
import { ChainCheck, CustodyHead, Mail } from "@/models";
import { makeChip, makeUser } from "../support/factory";
import { asAdmin, changeBody } from "../support/tamper";

const row = async (chain: string) => (await ChainCheck.findByPk(chain))!;
/** About this case: other tests leave logs behind that don't check out. */
const mailsTo = (email: string, ref: string) => Mail.findAll({ where: { recipient: email, subject: { [Op.like]: `The custody log of case ${ref},%` } } });
const wrong = (body: Buffer) => Buffer.from(body.toString("utf8").replace("PN 4471", "PN 4472"));
/** A day later. */
const later = () => asAdmin((db) => db.query("UPDATE chain_checks SET checked_at = UTC_TIMESTAMP(6) - INTERVAL 25 HOUR"));

describe("the daily check of every chain", () => {
  it("checks each chain once a day, the workshop's too, and leaves when and what", async () => {
    const { driveId } = await makeChip(await makeUser("technician"));
    // other tests may have had a log checked already
    await later();
    await checkChains();
    const heads = await CustodyHead.findAll();
    for (const chain of [WORKSHOP_CHAIN, driveId]) {
      expect(await row(chain)).toMatchObject({ entries: heads.find((h) => h.chainId === chain)!.seq, findings: 0, firstFinding: null });
    }
    const at = (await row(driveId)).checkedAt;
    expect((await checkChains()).checked).toBe(0);
    expect((await row(driveId)).checkedAt).toEqual(at);
    await later();
    expect((await checkChains()).checked).toBeGreaterThanOrEqual(2);
  });

  it("mails the step from clean to not clean once, to leads, admins and the auditors who may see the case", async () => {
    const { driveId, ref, caseId } = await makeChip(await makeUser("technician"));
    const [lead, admin, auditor, technician, named, other, ended, off] = await Promise.all(
      (["lead", "admin", "auditor", "technician", "auditor", "auditor", "auditor", "lead"] as const).map((role) => makeUser(role)));
    await asAdmin(async (db) => {
      await db.query("UPDATE users SET limited = TRUE WHERE id IN (?)", [[named.id, other.id]]);
      await db.query("INSERT INTO user_cases (user_id, case_id) VALUES (?, ?)", [named.id, caseId]);
      await db.query("UPDATE users SET ends_at = UTC_TIMESTAMP(6) - INTERVAL 1 HOUR WHERE id = ?", [ended.id]);
      await db.query("UPDATE users SET disabled_at = UTC_TIMESTAMP(6) WHERE id = ?", [off.id]);
    });
    await checkChains();
    await later();
    const others = (await checkChains()).notClean;
    const undo = await changeBody(driveId, 1, wrong);
    try {
      for (let day = 0; day < 2; day += 1) {
        await later();
        expect((await checkChains()).notClean).toBe(others + 1);
      }
      const found = await row(driveId);
      expect(found.findings).toBeGreaterThanOrEqual(1);
      expect(found.firstFinding).toMatch(/^Entry 1: The entry is not the one whose digest was stored/);
      for (const { email } of [lead, admin, auditor, named]) {
        const mails = await mailsTo(email, ref);
        expect([email, mails.length]).toEqual([email, 1]);
        expect(mails[0].subject).toBe(`The custody log of case ${ref}, Drive A doesn't check out`);
        expect(mails[0].textMasked).toContain(found.firstFinding);
        expect(mails[0].textMasked).not.toContain("Lindmoor");
      }
      for (const { email } of [technician, other, ended, off]) expect(await mailsTo(email, ref)).toHaveLength(0);
    } finally {
      await undo();
    }
    await later();
    expect((await checkChains()).notClean).toBe(others);
    expect(await row(driveId)).toMatchObject({ findings: 0, firstFinding: null });
    expect(await mailsTo(lead.email, ref)).toHaveLength(1);
    const again = await changeBody(driveId, 1, wrong);
    await later();
    await checkChains();
    await again();
    expect(await mailsTo(lead.email, ref)).toHaveLength(2);
  });

  it("counts an auditor's check as one, and a mere look as none", async () => {
    const auditor = await makeUser("auditor");
    const { driveId } = await makeChip(await makeUser("technician"));
    expect(await ChainCheck.findByPk(driveId)).toBeNull();
    await custodyCheckOfDrive(auditor, driveId);
    expect(await ChainCheck.findByPk(driveId)).toBeNull();
    const check = await checkChain(auditor, driveId);
    expect(await row(driveId)).toMatchObject({ entries: check.entries, findings: 0 });
  });

  it("is clean while entries are being appended", async () => {
    const technician = await makeUser("technician");
    const { driveId } = await makeChip(technician);
    let going = true;
    const appending = (async () => {
      for (let i = 0; i < 60; i += 1) await recordBoard(technician, driveId, { role: "donor", boardNumber: "BX 40-3179", revision: `rev ${i}` });
      going = false;
    })();
    for (; going;) expect((await checkCustody(driveId)).findings).toEqual([]);
    await appending;
  });

  it("mails once when two find the same thing at once", async () => {
    const lead = await makeUser("lead");
    const { driveId, ref } = await makeChip(await makeUser("technician"));
    await Promise.all([1, 2, 3, 4].map(() => recordChainCheck(driveId, { entries: 3, findings: [{ seq: 2, problem: "signature" }] })));
    expect(await mailsTo(lead.email, ref)).toHaveLength(1);
    await recordChainCheck(driveId, { entries: 3, findings: [] });
  });
});
