import { execFileSync } from "node:child_process";
import { describe, expect, it } from "vitest";
import { overviewLines } from "@/components/audit/audit-words";
import { appendEntry } from "@/lib/commands/append-entry";
import { assessLog } from "@/lib/commands/assess-log";
import { checkChain } from "@/lib/commands/check-chain";
import { createBenchToken } from "@/lib/commands/create-bench-token";
import { handOutImage } from "@/lib/commands/hand-out-image";
import { makeSeal } from "@/lib/commands/make-seal";
import { revokeApproval } from "@/lib/commands/revoke-approval";
import { AUDIT_LISTS, WORKSHOP_LISTS } from "@/lib/core/audit";
import { SYSTEM, WORKSHOP_CHAIN, type Actor } from "@/lib/core/words";
import { auditAssessments, logsWaiting } from "@/lib/queries/audit-assessments";
import { clockNow } from "@/lib/queries/audit-clock";
import { auditDrives, chainCounts } from "@/lib/queries/audit-drives";
import { auditEntries, auditPersons } from "@/lib/queries/audit-entries";
import { auditFile, auditPage } from "@/lib/queries/audit-files";
import { auditImages } from "@/lib/queries/audit-images";
import { auditOverview } from "@/lib/queries/audit-overview";
import { auditSeals, sealState } from "@/lib/queries/audit-seals";
import { auditSessions, auditTokens } from "@/lib/queries/audit-sign-ins";
import { auditInput, type AuditInput } from "@/lib/schemas/audit";
import { ChainCheck, CustodyHead, inTransaction, Session } from "@/models";
import { readNamed, refusal } from "../support/bench-steps";
import { approve, makeApprovedBench, makeChip, makeReadyBench, makeUser, sha256 } from "../support/factory";
import { changeBody, withoutTriggers } from "../support/tamper";

const asked = (more: Partial<AuditInput> = {}) => auditInput.parse({ pageSize: 200, ...more });
const only = (actor: Actor, ...cases: string[]): Actor => ({ ...actor, cases });
const HOSTILE = ['=1+1', "+SUM(A1)", "-2+3", "@cmd", "\ttab first", 'say "so", then\nnext line\r\nand "more"', "ends in a return\r", "plain ÆØ 漢字 😀"];

/** What a program that is not ours reads in the file. */
async function csv(actor: Actor, name: (typeof AUDIT_LISTS)[number], input: Partial<AuditInput> = {}): Promise<Record<string, string>[]> {
  const { stream } = await auditFile(actor, name, asked(input));
  const bytes = Buffer.from(await new Response(stream).arrayBuffer());
  const script = "import csv,io,json,sys\nt=sys.stdin.buffer.read().decode('utf-8')\nprint(json.dumps(list(csv.DictReader(io.StringIO(t,newline=''),strict=True))))";
  return JSON.parse(execFileSync("python3", ["-c", script], { input: bytes, maxBuffer: 64 << 20 }).toString()) as Record<string, string>[];
}

describe("hand-outs and refusals", () => {
  it("show what left, to whom and why, newest first, and are found by case, person and word", async () => {
    const bench = await makeReadyBench();
    const auditor = await makeUser("auditor");
    const read = await readNamed(bench, "before", 1);
    await handOutImage(auditor, read.id, { reason: "Compared with a copy of 40 % from the customer" });
    const { items } = await auditEntries(auditor, "hand-outs", asked({ q: bench.chip.ref }));
    expect(items).toMatchObject([{ what: "Read 1 of U12", digest: sha256(bench.image), to: auditor.name, reason: "Compared with a copy of 40 % from the customer", caseRef: bench.chip.ref, letter: "A", trouble: null }]);
    const count = async (more: Partial<AuditInput>) => (await auditEntries(auditor, "hand-outs", asked(more))).items.filter((row) => row.caseRef === bench.chip.ref).length;
    expect(await count({ who: auditor.name })).toBe(1);
    expect(await count({ who: bench.lead.name })).toBe(0);
    expect(await count({ q: "copy 40 %" })).toBe(1);
    expect(await count({ q: "copy 4_ %" })).toBe(0);
    expect(await count({ what: "bundle.started" })).toBe(0);
    expect(await count({ from: "2099-01-01" })).toBe(0);
    expect(await count({ to: "2001-01-01" })).toBe(0);
    expect(await auditPersons(auditor, "hand-outs")).toContain(auditor.name);
  });

  it("name the rule an approval was refused by, and why one was revoked", async () => {
    const bench = await makeReadyBench();
    await expect(approve({ ...bench.technician, role: "lead" }, bench.chip, bench.image)).rejects.toThrow();
    const approval = await approve(bench.lead, bench.chip, bench.image);
    await revokeApproval(bench.lead, approval.id, { reason: "The donor board was dropped." });
    const { items } = await auditEntries(bench.lead, "refusals", asked({ q: bench.chip.ref, sort: "time", order: "asc" }));
    expect(items.map((row) => row.action)).toEqual(["approval.refused", "approval.revoked"]);
    expect(items[0].reason).toMatch(/\S/);
    expect(items[1].reason).toBe("The donor board was dropped.");
  });

  it("are paged by the database without losing or doubling a row", async () => {
    const bench = await makeReadyBench();
    const read = await readNamed(bench, "before", 1);
    for (let i = 0; i < 7; i += 1) await handOutImage(bench.lead, read.id, { reason: `Number ${i}` });
    const seen: string[] = [];
    for (const page of [1, 2, 3]) seen.push(...(await auditEntries(bench.lead, "hand-outs", asked({ q: bench.chip.ref, page, pageSize: 3 }))).items.map((row) => row.reason));
    expect(seen).toEqual([6, 5, 4, 3, 2, 1, 0].map((i) => `Number ${i}`));
  });
});

describe("a body that somebody changed", () => {
  it("is shown as damaged and never stops the list", async () => {
    const bench = await makeReadyBench();
    const read = await readNamed(bench, "before", 1);
    await handOutImage(bench.lead, read.id, { reason: "Before the change" });
    const { seq } = (await CustodyHead.findByPk(bench.chip.driveId))!;
    for (const [change, trouble] of [
      [() => Buffer.from([0xff, 0xfe, 0x00, 0x7b]), /can't be read/],
      [() => Buffer.from('{"action":"image.handed-out","facts":[],"actor":7,"at":{}}'), /another shape/],
      [() => Buffer.from("null"), /signed body says nothing/],
      [(body: Buffer) => Buffer.from(body.toString().replace('"image.handed-out"', '"__proto__"')), /signed body says __proto__/],
    ] as const) {
      const undo = await changeBody(bench.chip.driveId, seq, change);
      try {
        const { items } = await auditEntries(bench.lead, "hand-outs", asked());
        const row = items.find((one) => one.chainId === bench.chip.driveId && one.seq === seq);
        expect(row).toMatchObject({ trouble: expect.stringMatching(trouble) as string });
        expect((await csv(bench.lead, "hand-outs")).find((one) => one.log === bench.chip.driveId)?.trouble).toMatch(trouble);
      } finally {
        await undo();
      }
    }
  });
});

describe("a file", () => {
  it("carries hostile text unchanged but for the apostrophe that keeps a spreadsheet from running it", async () => {
    const bench = await makeReadyBench();
    for (const text of HOSTILE) {
      await inTransaction((tx) => appendEntry(tx, bench.chip.driveId, bench.lead, "log.assessed", { type: "drive", id: bench.chip.driveId }, { text }));
    }
    const rows = await csv(bench.lead, "assessments", { q: bench.chip.ref });
    expect(rows.map((row) => row.assessment)).toEqual(HOSTILE.map((text) => (/^[=+\-@\t\r\n\0]/.test(text) ? `'${text}` : text)));
    expect(rows.every((row) => /^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{6}Z$/.test(row.time) && row.case === bench.chip.ref)).toBe(true);
  });

  it("has a header and no row where the list is empty, and every list makes one", async () => {
    const lead = await makeUser("lead");
    for (const name of AUDIT_LISTS) expect(await csv(lead, name, { q: "no such thing anywhere", what: name === "seals" ? "no such cause" : "" }), name).toEqual([]);
    const { stream } = await auditFile(lead, "tokens", asked({ q: "no such thing anywhere" }));
    expect(await new Response(stream).text()).toBe("token,who,role,made,last used,withdrawn\r\n");
  });

  it("holds all rows of a list that is longer than a batch, oldest first", async () => {
    const bench = await makeReadyBench();
    for (let i = 0; i < 205; i += 1) await inTransaction((tx) => appendEntry(tx, bench.chip.driveId, bench.lead, "log.assessed", { type: "drive", id: bench.chip.driveId }, { text: `Assessment ${i}` }));
    const rows = await csv(bench.lead, "assessments", { q: bench.chip.ref });
    expect(rows.map((row) => row.assessment)).toEqual(Array.from({ length: 205 }, (_, i) => `Assessment ${i}`));
  }, 120_000);
});

describe("an auditor with a list of cases", () => {
  it("sees rows of their cases only, and nothing of the workshop as a whole", async () => {
    const [mine, other] = [await makeApprovedBench(), await makeApprovedBench()];
    const whole = await makeUser("auditor");
    const limited = only(whole, mine.chip.caseId);
    for (const bench of [mine, other]) {
      await handOutImage(whole, (await readNamed(bench, "before", 1)).id, { reason: "For the report" });
      await revokeApproval(bench.lead, bench.approvalId, { reason: "Asked to" });
      await assessLog(whole, bench.chip.driveId, { text: "Looked at every entry." });
    }
    for (const list of ["hand-outs", "refusals", "assessments", "clock"] as const) {
      const { items } = await auditEntries(limited, list, asked());
      expect(items.filter((row) => row.caseId !== mine.chip.caseId), list).toEqual([]);
      if (list !== "clock") expect(items.length, list).toBeGreaterThan(0);
      expect((await csv(limited, list)).filter((row) => row.case !== mine.chip.ref), list).toEqual([]);
    }
    expect((await auditDrives(limited, asked())).items.map((row) => row.driveId)).toEqual([mine.chip.driveId]);
    expect(await chainCounts(limited)).toMatchObject({ total: 1 });
    const images = (await auditImages(limited, asked())).items;
    expect(images.length).toBeGreaterThan(0);
    expect(images.flatMap((image) => image.uses).filter((use) => !use.name.startsWith(`Case ${mine.chip.ref},`))).toEqual([]);
    expect((await auditImages(limited, asked({ q: sha256(other.image) }))).total).toBe(0);
    for (const list of WORKSHOP_LISTS) {
      expect(await refusal(auditPage(limited, list, asked())), list).toMatchObject({ status: 404 });
      expect(await refusal(auditFile(limited, list, asked())), list).toMatchObject({ status: 404 });
    }
    expect((await auditDrives(only(whole), asked())).total).toBe(0);
    expect((await auditEntries(only(whole), "hand-outs", asked())).total).toBe(0);
  });

  it("is the only one besides lead and admin: a technician is told so", async () => {
    const technician = await makeUser("technician");
    for (const list of AUDIT_LISTS) expect(await refusal((async () => auditPage(technician, list, asked()))()), list).toMatchObject({ status: 403 });
  });
});

describe("drives and assessments", () => {
  it("list every log with its last check, a log without a drive and the workshop's among them", async () => {
    const lead = await makeUser("lead");
    const chip = await makeChip(lead);
    await ChainCheck.upsert({ chainId: chip.driveId, checkedAt: new Date("2026-11-03T09:00:00Z"), entries: 5, findings: 2, firstFinding: "Entry 3 doesn't link." });
    const { items, total } = await auditDrives(lead, asked({ q: chip.ref }));
    expect(total).toBe(1);
    expect(items[0]).toMatchObject({ caseRef: chip.ref, letter: "A", workshop: false, entries: 6, check: { at: "2026-11-03T09:00:00.000Z", findings: 2, first: "Entry 3 doesn't link." } });
    expect(items[0].hash).toMatch(/^[0-9a-f]{64}$/);
    const all = await chainCounts(lead);
    expect(all.findings).toBeGreaterThan(0);
    expect(all.total).toBe(all.clean + all.findings + all.unchecked);
    expect((await auditDrives(lead, asked({ what: "findings" }))).items.every((row) => (row.check?.findings ?? 0) > 0)).toBe(true);
    const unchecked: boolean[] = [];
    for (let page = 1; page <= 10; page += 1) unchecked.push(...(await auditDrives(lead, asked({ page }))).items.map((row) => row.workshop));
    expect(unchecked.filter(Boolean)).toHaveLength(1);
    await ChainCheck.upsert({ chainId: chip.driveId, checkedAt: new Date(), entries: 5, findings: 0, firstFinding: null });
  });

  it("say which drive waits for an assessment, and afterwards which findings it covered", async () => {
    const bench = await makeReadyBench();
    const auditor = await makeUser("auditor");
    const undo = await changeBody(bench.chip.driveId, 2, (body) => Buffer.from(body.toString().replace("BX 40", "BX 41")));
    try {
      await ChainCheck.upsert({ chainId: bench.chip.driveId, checkedAt: new Date(), entries: 9, findings: 3, firstFinding: "Entry 2" });
      const waiting = (await logsWaiting(auditor)).find((drive) => drive.driveId === bench.chip.driveId);
      expect(waiting?.findings.some((f) => f.seq === 2)).toBe(true);
      expect((await logsWaiting(only(auditor))).length).toBe(0);
      await assessLog(auditor, bench.chip.driveId, { text: "The board number was changed in the database; the ticket has the right one." });
      expect((await logsWaiting(auditor)).filter((drive) => drive.driveId === bench.chip.driveId)).toEqual([]);
      await assessLog(auditor, bench.chip.driveId, { text: "Looked at it once more." });
      const { items } = await auditAssessments(auditor, asked({ q: bench.chip.ref, order: "asc" }));
      expect(items[0].covered.some((f) => f.seq === 2)).toBe(true);
      expect(items[1].covered).toEqual([]);
    } finally {
      await undo();
      await ChainCheck.destroy({ where: { chainId: bench.chip.driveId } }).catch(() => ChainCheck.update({ findings: 0 }, { where: { chainId: bench.chip.driveId } }));
    }
  });
});

describe("a fault in the workshop's own log", () => {
  it("stands first among what is wrong, closes no drive, and waits for an auditor's assessment", async () => {
    const bench = await makeReadyBench();
    const [auditor, admin] = [await makeUser("auditor"), await makeUser("admin")];
    await assessLog(auditor, WORKSHOP_CHAIN, { text: "What earlier tests have left here was looked at." });
    const at = (await CustodyHead.findByPk(WORKSHOP_CHAIN))!.seq;
    await inTransaction((tx) => appendEntry(tx, WORKSHOP_CHAIN, SYSTEM, "sign-in.limited", { type: "user", id: SYSTEM.id }, { address: "203.0.113.78", accountDigest: "ab".repeat(32) }));
    const undo = await changeBody(WORKSHOP_CHAIN, at + 1, (body) => Buffer.from(body.toString().replace("203.0.113.78", "203.0.113.79")));
    const own = async () => (await logsWaiting(auditor)).find((log) => log.workshop);
    try {
      await checkChain(auditor, WORKSHOP_CHAIN);
      expect((await own())?.findings.some((f) => f.seq === at + 1)).toBe(true);
      const logs = overviewLines(await auditOverview(auditor)).find((line) => line.key === "drives")!;
      expect([logs.mark, logs.sentence]).toEqual(["block", expect.stringContaining("The workshop's own log") as string]);
      expect((await logsWaiting(only(auditor))).length).toBe(0);
      expect(await refusal(assessLog(only(auditor), WORKSHOP_CHAIN, { text: "Looked." }))).toMatchObject({ status: 404 });
      expect(await refusal(assessLog(admin, WORKSHOP_CHAIN, { text: "Looked." }))).toMatchObject({ status: 403 });
      await approve(bench.lead, bench.chip, bench.image);
      await assessLog(auditor, WORKSHOP_CHAIN, { text: "The address was changed in the log; the proxy's own records have another." });
      expect(await own()).toBeUndefined();
    } finally {
      await undo();
      await checkChain(auditor, WORKSHOP_CHAIN);
    }
  });
});

describe("sign-ins and the clock", () => {
  it("tell who was signed in and how it ended, and which tokens there are, without anything that opens a door", async () => {
    const admin = await makeUser("admin");
    const now = Date.now();
    const open = { id: crypto.randomUUID(), userId: admin.id, createdAt: new Date(now - 60_000), lastSeenAt: new Date(now - 1000) };
    await Session.create(open);
    await Session.create({ id: crypto.randomUUID(), userId: admin.id, createdAt: new Date(now - 7_200_000), lastSeenAt: new Date(now - 7_000_000), endedAt: new Date(now - 100_000) });
    const sessions = await auditSessions(admin, asked({ q: admin.name }));
    expect(sessions.items.filter((row) => row.who === admin.name).map((row) => row.how)).toEqual(["open", "idle"]);
    const { token } = await createBenchToken(admin, { name: "=Bench 3", userId: admin.id });
    const tokens = await auditTokens(admin, asked({ q: "=Bench 3" }));
    expect(tokens.items[0]).toMatchObject({ name: "=Bench 3", who: admin.name, lastUsed: null, withdrawn: null });
    const said = JSON.stringify([sessions, tokens, await csv(admin, "sessions"), await csv(admin, "tokens")]);
    for (const secret of [token, open.id]) expect(said).not.toContain(secret);
    expect((await csv(admin, "tokens", { q: "=Bench 3" }))[0].token).toBe("'=Bench 3");
  });

  it("show sign-ins that were refused by their number", async () => {
    const lead = await makeUser("lead");
    await inTransaction((tx) => appendEntry(tx, WORKSHOP_CHAIN, SYSTEM, "sign-in.limited", { type: "user", id: SYSTEM.id }, { address: "203.0.113.77", accountDigest: "ab".repeat(32) }));
    expect((await auditEntries(lead, "limits", asked({ q: "203.0.113.77" }))).items[0]).toMatchObject({ what: "203.0.113.77", workshop: true });
  });

  it("find an entry that was written while the database's clock was behind", async () => {
    const bench = await makeReadyBench();
    const { driveId } = bench.chip;
    const { seq } = (await CustodyHead.findByPk(driveId))!;
    const undo = await changeBody(driveId, seq, (body) => Buffer.from(body.toString().replace(/"facts":\{/, '"facts":{"clockBehindMs":1234,')));
    try {
      const { items } = await auditEntries(bench.lead, "clock", asked({ q: bench.chip.ref }));
      // the fact was put in by somebody without the key: it is shown, and what is wrong with it
      expect(items).toMatchObject([{ seq, clockBehindMs: 1234, headBehind: null, trouble: expect.stringContaining("text was changed") as string }]);
    } finally {
      await undo();
    }
    // a word that a person typed is no fact of the clock
    await assessLog(await makeUser("auditor"), driveId, { text: 'Somebody wrote "clockBehindMs":99 here.' });
    expect((await auditEntries(bench.lead, "clock", asked({ q: bench.chip.ref }))).items).toEqual([]);
    const clock = await clockNow(bench.lead);
    expect(Math.abs(clock.offsetMs)).toBeLessThan(1000);
    expect(clock.withinMs).toBeLessThan(500);
  });
});

describe("the chain of seals", () => {
  it("names the seal that was changed and the one that no longer links to it, and a gap", async () => {
    const auditor = await makeUser("auditor");
    const made: number[] = [];
    for (let i = 0; i < 3; i += 1) made.push((await makeSeal(auditor, "asked")).number);
    const rows = async () => (await auditSeals(auditor, asked())).items;
    expect((await rows()).slice(0, 3)).toMatchObject(made.toReversed().map((number) => ({ number, cause: "asked", faults: [] })));
    expect(await sealState(auditor)).toMatchObject({ today: true, faulty: [], newest: { number: made[2], mailed: { waiting: expect.any(Number) as number } } });
    // the second one's text says other logs than it did
    const change = (from: string, to: string) => withoutTriggers(["seals"], (db) => db.query("UPDATE seals SET text = REPLACE(text, ?, ?) WHERE number = ?", [from, to, made[1]]));
    await change("twinread-seal/1", "twinread-seal/2");
    try {
      const faults = new Map((await rows()).map((row) => [row.number, row.faults.join(" ")]));
      expect(faults.get(made[1])).toContain("not a seal");
      expect(faults.get(made[2])).toContain(`does not carry the SHA-256 of seal ${made[1]}`);
      expect((await sealState(auditor)).faulty).toEqual([made[1], made[2]]);
      expect((await csv(auditor, "seals")).find((row) => row.number === String(made[1]))?.faults).toContain("not a seal");
    } finally {
      await change("twinread-seal/2", "twinread-seal/1");
    }
    const copy = await withoutTriggers(["seals"], async (db) => {
      const [row] = await db.query<Record<string, unknown>[]>("SELECT * FROM seals WHERE number = ?", [made[1]]);
      await db.query("DELETE FROM seals WHERE number = ?", [made[1]]);
      return row;
    });
    try {
      expect((await rows()).find((row) => row.number === made[2])?.faults).toEqual([`Seal ${made[1]} is missing before it.`]);
      expect((await sealState(auditor)).faulty).toEqual([made[2]]);
    } finally {
      await withoutTriggers(["seals"], (db) => db.query(`INSERT INTO seals (${Object.keys(copy).join(", ")}) VALUES (${Object.keys(copy).map(() => "?").join(", ")})`, Object.values(copy)));
    }
    expect((await sealState(auditor)).faulty).toEqual([]);
  });
});

describe("a check that somebody asks for", () => {
  it("is written down for the list, and is refused for a case that is not theirs", async () => {
    const bench = await makeReadyBench();
    const other = await makeReadyBench();
    const auditor = await makeUser("auditor");
    expect(await checkChain(auditor, bench.chip.driveId)).toMatchObject({ ok: true });
    expect((await auditDrives(auditor, asked({ q: bench.chip.ref }))).items[0].check).toMatchObject({ findings: 0 });
    expect(await checkChain(auditor, WORKSHOP_CHAIN)).toMatchObject({ entries: expect.any(Number) as number });
    const limited = only(auditor, bench.chip.caseId);
    await checkChain(limited, bench.chip.driveId);
    for (const chain of [other.chip.driveId, WORKSHOP_CHAIN, crypto.randomUUID()]) expect(await refusal(checkChain(limited, chain))).toMatchObject({ status: 404 });
    expect(await refusal(checkChain(auditor, crypto.randomUUID()))).toMatchObject({ status: 404 });
    expect(await refusal(checkChain(bench.technician, bench.chip.driveId))).toMatchObject({ status: 403 });
  });
});
