import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import MailComposer from "nodemailer/lib/mail-composer";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { makeBundle } from "@/lib/commands/make-bundle";
import { makeSeal, type MadeSeal } from "@/lib/commands/make-seal";
import { witnessSeals } from "@/lib/commands/witness-seals";
import { env } from "@/lib/env";
import { sealMailText, withNewestSeal } from "@/lib/mail/seal-text";
import { checkAgainst } from "@/scripts/check/against";
import type { Here } from "@/scripts/check/against-bundle";
import { exitCode } from "@/scripts/check/report";
import { checkStore } from "@/scripts/check/store";
import { lookNow } from "../support/check-here";
import { emptyHouse } from "../support/empty-house";
import { type Bench, makeApprovedBench, makeUser } from "../support/factory";
import { withoutTriggers } from "../support/tamper";

const dir = mkdtempSync(path.join(os.tmpdir(), "twinread-against-"));
const put = (name: string, content: string | Buffer) => {
  writeFileSync(path.join(dir, name), content);
  return path.join(dir, name);
};
let bench: Bench;
let early: MadeSeal;
let late: MadeSeal;
let bundle = "";
let here: Here;

const mailOf = (text: string, options: object = {}): Promise<Buffer> => new MailComposer({ from: "workshop@alder.example", to: "auditor@elsewhere.example", subject: "Seal", text, ...options }).compile().build();
const sealMail = (seal: MadeSeal) => sealMailText({ workshop: "Alder Länë 漢", ...seal });
const quoted = (text: string, mark = "> ") => text.split("\n").map((line) => `${mark}${line}`).join("\n");

/** The exit code and what was found, of one file against the database as it was looked at. */
async function against(file: string, look: Here = here) {
  const found = await checkAgainst([file], look);
  return { code: exitCode(found), problems: found.damage.map((one) => one.problem), sentences: found.damage.map((one) => one.sentence).join(" "), copy: found.against[0], ...found };
}

beforeAll(async () => {
  await emptyHouse();
  bench = await makeApprovedBench();
  const auditor = await makeUser("auditor");
  early = await makeSeal(auditor, "asked");
  const { stream } = await makeBundle(bench.lead, bench.chip.caseId);
  const chunks: Buffer[] = [];
  for await (const chunk of stream) chunks.push(chunk as Buffer);
  bundle = put("bundle.zip", Buffer.concat(chunks));
  late = await makeSeal(auditor, "asked");
  await witnessSeals();
  ({ here } = await lookNow());
});
afterAll(() => rmSync(dir, { recursive: true }));

/** The same database as it was before its newest seals were made. */
const backBefore = (number: number): Here => ({
  ...here, known: new Map([...here.known].filter(([n]) => n < number)), ledger: { ...here.ledger, sealsMade: here.ledger.sealsMade.filter((one) => one.number < number) },
});

describe("a copy from outside that the database agrees with", () => {
  it("is the whole store, clean, with seal, mail, bundle and witness file", async () => {
    const files = [put("seal.txt", late.text), put("mail.eml", await mailOf(sealMail(early))), bundle, env().witnessFile];
    put("seal.sig", Buffer.from(late.signature, "base64"));
    const report = await checkStore(files);
    expect(report.damage).toEqual([]);
    expect(report.notChecked).toEqual([]);
    expect(report.against.map(({ kind, agrees }) => [kind, agrees])).toEqual([["seal", true], ["mail", true], ["bundle", true], ["witness", true]]);
    expect(report.against[0].seals).toEqual([{ number: late.number, sha256: late.sha256, signature: "fits" }]);
    expect(report.against[2].heads).toEqual([expect.objectContaining({ chain: bench.chip.driveId })]);
    expect(exitCode(report)).toBe(0);
  });

  it.each([
    ["7bit", {}], ["quoted-printable", { textEncoding: "quoted-printable" }], ["base64", { textEncoding: "base64" }],
    ["html only", { text: undefined, html: "HTML" }], ["forwarded as an attachment", { text: "See below.", attachments: "FORWARD" }],
  ])("is a mail in %s", async (_, options: Record<string, unknown>) => {
    const original = await mailOf(sealMail(early));
    if (options.html) options = { ...options, html: `<p>Fwd</p><pre>${sealMail(early)}</pre>` };
    if (options.attachments) options = { ...options, attachments: [{ filename: "fwd.eml", content: original, contentType: "message/rfc822" }] };
    const { copy, code } = await against(put("m.eml", await mailOf(sealMail(early), options)));
    expect(code).toBe(0);
    expect(copy.seals.find((seal) => seal.number === early.number)).toEqual({ number: early.number, sha256: early.sha256, signature: "fits" });
  });

  it.each(["> ", "> > ", ">> ", "   ", "| "])("is a mail quoted with '%s', with CRLF and blank lines between", async (mark) => {
    const text = quoted(sealMail(early), mark).replace(/\n/g, "\r\n\r\n");
    expect((await against(put("q.txt", text))).copy.seals[0]).toEqual({ number: early.number, sha256: early.sha256, signature: "fits" });
  });

  it("is the header and the last lines of any other mail", async () => {
    const mail = await mailOf(withNewestSeal("The drive is ready.", late), { headers: { "X-Twinread-Seal": `${early.number} ${early.sha256}` } });
    expect((await against(put("any.eml", mail))).copy.seals.map((seal) => [seal.number, seal.signature])).toEqual([[early.number, "not given"], [late.number, "not given"]]);
  });

  it("is a seal without a signature beside it, which is said", async () => {
    expect((await against(put("alone.txt", early.text))).copy.holds).toEqual([`Seal ${early.number}: its signature is not given. The database holds the very same.`]);
  });
});

describe("a database that a copy from outside contradicts", () => {
  it("does not hold the seal: put back, or removed", async () => {
    const back = backBefore(late.number);
    for (const file of [put("late.txt", late.text), put("late.eml", await mailOf(quoted(sealMail(late)))), put("late.jsonl", `${JSON.stringify({ keyId: late.keyId, seal: late.text, signature: late.signature })}\n`)]) {
      const found = await against(file, back);
      expect(found.code).toBe(1);
      expect(found.sentences).toContain(`The database does not hold seal ${late.number} of`);
      expect(found.sentences).toContain("it was put back to an earlier state, or the seal was removed.");
    }
  });

  it("holds another seal of that number", async () => {
    const other = late.text.replace(/\n[0-9a-f]{64}\n/, `\n${"ab".repeat(32)}\n`);
    put("other.sig", Buffer.from(late.signature, "base64"));
    const found = await against(put("other.txt", other));
    expect(found.problems).toEqual(["outside-seal", "outside-seal"]);
    expect(found.sentences).toContain(`The database holds another seal ${late.number}`);
    expect(found.copy.seals[0].signature).toBe("does not fit");
  });

  it("is contradicted by a mail's number and digest alone", async () => {
    expect((await against(put("x.txt", `X-Twinread-Seal: ${late.number} ${"cd".repeat(32)}\n`))).problems).toEqual(["outside-seal"]);
    expect((await against(put("x.txt", `X-Twinread-Seal: ${late.number + 99} ${"cd".repeat(32)}\n`))).problems).toEqual(["outside-seal-missing"]);
  });

  it("has another entry, a shorter log or no such image, and the bundle says which", async () => {
    const chain = bench.chip.driveId;
    const entries = (change: (log: Map<number, string>) => void): Here => {
      const log = new Map(here.ledger.entries.get(chain));
      change(log);
      return { ...here, ledger: { ...here.ledger, entries: new Map(here.ledger.entries).set(chain, log) } };
    };
    const changed = await against(bundle, entries((log) => log.set(3, "ab".repeat(32))));
    expect([changed.code, changed.damage[0]]).toMatchObject([1, { place: expect.stringContaining("Drive A") as string, seq: 3, problem: "outside-entry" }]);
    const cut = await against(bundle, entries((log) => [...log.keys()].filter((seq) => seq > 5).forEach((seq) => log.delete(seq))));
    expect(cut.damage).toMatchObject([{ seq: 6, problem: "outside-entry-missing", sentence: expect.stringContaining("ends at entry 5") as string }]);
    expect((await against(bundle, { ...here, images: new Set([...here.images].slice(1)) })).problems.every((problem) => problem === "outside-image")).toBe(true);
    const noKeys = { ...here.ledger.ring, keys: new Map<string, string>() };
    expect((await against(bundle, { ...here, ledger: { ...here.ledger, ring: noKeys } })).problems).toContain("outside-key");
  });

  it("is held against a damaged bundle too, which is named as damaged", async () => {
    const bytes = readFileSync(bundle);
    bytes[bytes.indexOf("data/case.json") + 60] ^= 1;
    const found = await against(put("damaged.zip", bytes));
    expect(found.problems).toContain("outside-file");
    expect(found.copy.heads.length).toBe(1);
  });
});

describe("a file that is none of these", () => {
  it.each([
    ["text", "Good morning.\nNothing here.\n"], ["nothing", ""], ["a seal cut short", "twinread-seal/1\n1\n2026-"], ["JSON", '{"a":1}\n{"b":2}\n'], ["the beginning of an archive", "PK\u0003\u0004rubbish"],
    ["a mail that never ends", `Content-Type: multipart/mixed; boundary=x\n\n${"--x\nContent-Type: multipart/mixed; boundary=x\n\n".repeat(500)}`], ["bytes", "\u0000\uffff".repeat(500)],
  ])("cannot be checked: %s", async (name, content) => {
    const file = put(`none-${name.length}.bin`, content);
    const found = await against(file);
    if (name.includes("archive")) expect(found.code).toBeGreaterThan(0);
    else expect([found.code, found.notChecked.length]).toEqual([2, 1]);
    expect((await against(path.join(dir, "missing.txt"))).code).toBe(2);
  });

  it("leaves damage to win over what could not be checked", async () => {
    const found = await checkAgainst([put("n.txt", "nothing"), put("late.txt", late.text)], backBefore(late.number));
    expect(exitCode(found)).toBe(1);
  });
});

describe("the seals of the database", () => {
  const seal = (n: number) => `Seal ${n}`;

  it("are clean as they are", async () => expect((await lookNow()).damage).toEqual([]));
  it.each([["sha256", Buffer.alloc(32), "seal-row"], ["prev", Buffer.alloc(32, 1), "seal-row"], ["chains", 999, "seal-row"], ["cause", "daily", "seal-row"], ["made_at", "2020-01-01 00:00:00.000001", "seal-row"],
    ["key_id", "ab".repeat(32), "seal"], ["signature", Buffer.alloc(64), "seal"], ["text", Buffer.from("twinread-seal/1\n"), "seal"], ["leaves", Buffer.from("{}\n"), "seal-leaves"]] as const)(
    "name a row whose %s was changed", async (column, value, problem) => {
      await withoutTriggers(["seals"], async (db) => {
        const [row] = await db.query<Record<string, unknown>[]>(`SELECT ${column} AS was FROM seals WHERE number = ?`, [early.number]);
        await db.query(`UPDATE seals SET ${column} = ? WHERE number = ?`, [value, early.number]);
        try {
          expect((await lookNow()).damage.map((one) => `${one.place}: ${one.problem}`)).toContain(`${seal(early.number)}: ${problem}`);
        } finally {
          await db.query(`UPDATE seals SET ${column} = ? WHERE number = ?`, [row.was, early.number]);
        }
      });
    });
  it("name one that was removed, from the middle and from the end", async () => {
    for (const number of [early.number, late.number]) {
      await withoutTriggers(["seals"], async (db) => {
        await db.query("CREATE TEMPORARY TABLE kept AS SELECT number, text, sha256, prev, key_id, signature, cause, made_at, chains, leaves FROM seals WHERE number = ?", [number]);
        await db.query("DELETE FROM seals WHERE number = ?", [number]);
        try {
          expect((await lookNow()).damage.map((one) => `${one.place}: ${one.problem}`)).toContain("Workshop log: seal-missing");
        } finally {
          await db.query("INSERT INTO seals (number, text, sha256, prev, key_id, signature, cause, made_at, chains, leaves) SELECT * FROM kept");
        }
      });
    }
  });
  it("name an entry that they saw otherwise, at its place", async () => {
    const { driveId } = bench.chip;
    await withoutTriggers(["custody_entries"], async (db) => {
      const [{ seq, body }] = await db.query<{ seq: number; body: Buffer }[]>("SELECT seq, body FROM custody_entries WHERE chain_id = ? ORDER BY seq DESC LIMIT 1", [driveId]);
      await db.query("UPDATE custody_entries SET body = CONCAT(body, ' ') WHERE chain_id = ? AND seq = ?", [driveId, seq]);
      expect((await lookNow()).damage).toContainEqual(expect.objectContaining({ problem: "sealed-entry", seq, place: expect.stringContaining("Drive A") as string, sentence: expect.stringContaining(`Seal ${late.number} of`) as string }));
      await db.query("UPDATE custody_entries SET body = ? WHERE chain_id = ? AND seq = ?", [body, driveId, seq]);
    });
  });
});
