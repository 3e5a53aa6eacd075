import { createHash } from "node:crypto";
import { QueryTypes } from "sequelize";
import { beforeAll, describe, expect, it } from "vitest";
import { GET as proofRoute } from "@/app/api/drives/[id]/proof/route";
import { GET as sealRoute } from "@/app/api/seals/[number]/route";
import { GET as listRoute, POST as askRoute } from "@/app/api/seals/route";
import { askForSeal } from "@/lib/commands/ask-for-seal";
import { makeSeal, sealNow } from "@/lib/commands/make-seal";
import { makeDailySeal } from "@/lib/commands/seal-daily";
import { parseSeal, proofHolds, sealRoot } from "@/lib/core/seal";
import { type Actor, SYSTEM, WORKSHOP_CHAIN } from "@/lib/core/words";
import { SEALS_AN_HOUR_PER_PERSON } from "@/lib/limits";
import { openText } from "@/lib/mail/sealed-text";
import { checkCustody } from "@/lib/queries/custody";
import { driveProof, leavesOf, newestSeal, sealByNumber, sealKeys, sealList } from "@/lib/queries/seals";
import type { DriveProofView, SealView } from "@/lib/views";
import { connection, CustodyHead, inTransaction, Mail, Seal, User } from "@/models";
import { refusal } from "../support/bench-steps";
import { lastEntry, logOf, type MadeChip, makeChip, makeUser } from "../support/factory";
import { race, times } from "../support/race";
import { callAs, lastSealRow, opensslAccepts } from "../support/sealed";
import { withoutTriggers } from "../support/tamper";

const sha256 = (bytes: Uint8Array | string) => createHash("sha256").update(bytes).digest("hex");
const keyOf = async (keyId: string) => (await sealKeys()).get(keyId)!;

let technician: Actor;
let auditor: Actor;
let admin: Actor;
let chip: MadeChip;

beforeAll(async () => {
  technician = await makeUser("technician");
  auditor = await makeUser("auditor");
  admin = await makeUser("admin");
  chip = await makeChip(technician);
});

describe("a seal", () => {
  it("states where every log stood, follows the one before, and is signed so that openssl accepts it", async () => {
    const [one, two] = [await makeSeal(SYSTEM, "bundle"), await makeSeal(auditor, "asked")];
    expect(two.number).toBe(one.number + 1);
    expect(parseSeal(two.text)).toMatchObject({ number: two.number, prev: sha256(one.text) });
    expect(two.sha256).toBe(sha256(two.text));
    const row = await lastSealRow();
    expect(row.text.toString("utf8")).toBe(two.text);
    const leaves = leavesOf(row.leaves);
    const rows = await connection().query<{ id: string; seq: number }>("SELECT chain_id AS id, seq FROM custody_heads WHERE seq > 0 ORDER BY chain_id", { type: QueryTypes.SELECT });
    expect(leaves.map((leaf) => leaf.drive)).toEqual(rows.map((head) => head.id));
    const head = (await CustodyHead.findByPk(chip.driveId))!;
    expect(leaves).toContainEqual({ drive: chip.driveId, head: head.hash.toString("hex"), seq: head.seq });
    expect(parseSeal(two.text)).toMatchObject({ chains: leaves.length, root: sealRoot(leaves, (bytes) => createHash("sha256").update(bytes).digest()) });
    expect(opensslAccepts(two.text, Buffer.from(two.signature, "base64"), await keyOf(two.keyId))).toBe(true);
    expect(await lastEntry(WORKSHOP_CHAIN, "seal.made")).toEqual({ number: two.number, sha256: two.sha256, root: parseSeal(two.text)!.root, chains: leaves.length, keyId: two.keyId, cause: "asked" });
    expect((await checkCustody(WORKSHOP_CHAIN)).findings).toEqual([]);
  });

  it("is refused by openssl with one digit of the root changed, and by the proof", async () => {
    const { text, signature, keyId } = await makeSeal(SYSTEM, "bundle");
    const { root } = parseSeal(text)!;
    const forged = text.replace(root, `${root.slice(0, -1)}${root.endsWith("0") ? "1" : "0"}`);
    expect(opensslAccepts(forged, Buffer.from(signature, "base64"), await keyOf(keyId))).toBe(false);
    const { proof } = await driveProof(auditor, chip.driveId);
    const digest = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest();
    expect(proofHolds(parseSeal(text)!, proof.proofs[0], digest)).toBe(true);
    expect(proofHolds(parseSeal(forged)!, proof.proofs[0], digest)).toBe(false);
  });

  it("asked for by eight at once is eight that follow one another", async () => {
    const before = (await newestSeal())!;
    const { won, lost } = await race(times(8, () => () => makeSeal(SYSTEM, "bundle")));
    expect(lost).toEqual([]);
    const made = won.sort((a, b) => a.number - b.number);
    expect(made.map((seal) => seal.number)).toEqual(times(8, (i) => before.number + 1 + i));
    made.forEach((seal, i) => expect(parseSeal(seal.text)!.prev).toBe(i === 0 ? before.sha256 : made[i - 1].sha256));
    const ats = made.map((seal) => parseSeal(seal.text)!.at);
    expect([...ats].sort()).toEqual(ats);
  });

  it("whose transaction does not end leaves no row, no entry and no mail", async () => {
    const count = async () => [await Seal.count(), (await logOf(WORKSHOP_CHAIN)).length, await Mail.count()];
    const before = await count();
    await expect(inTransaction(async (tx) => {
      await makeSeal(auditor, "asked", tx);
      throw new Error("power cut");
    })).rejects.toThrow("power cut");
    expect(await count()).toEqual(before);
  });

  it("holds what its own transaction has appended", async () => {
    const { leaves, head } = await inTransaction(async (tx) => {
      const { appendEntry } = await import("@/lib/commands/append-entry");
      const appended = await appendEntry(tx, chip.driveId, auditor, "log.assessed", { type: "drive", id: chip.driveId }, { text: "Looked at all of it." });
      return { ...(await sealNow(tx, auditor, "bundle")), head: appended };
    });
    expect(leaves).toContainEqual({ drive: chip.driveId, head: head.hash, seq: head.seq });
  });

  it("can't be changed or taken back by the app's own database user", async () => {
    for (const statement of ["UPDATE seals SET cause = 'asked'", "DELETE FROM seals", "TRUNCATE TABLE seals", "DROP TABLE seals"]) {
      await expect(connection().query(statement), statement).rejects.toThrow(/denied|append-only/);
    }
  });

  it("never bears the number of one that was taken out of the table: the log still tells of it", async () => {
    const row = await lastSealRow();
    await withoutTriggers(["seals"], (db) => db.query("DELETE FROM seals WHERE number = ?", [row.number]));
    try {
      let text = "";
      await expect(inTransaction(async (tx) => {
        ({ text } = await makeSeal(SYSTEM, "bundle", tx));
        throw new Error("only to look");
      })).rejects.toThrow("only to look");
      expect(parseSeal(text)).toMatchObject({ number: row.number + 1, prev: row.sha256.toString("hex") });
    } finally {
      await withoutTriggers(["seals"], (db) => db.query("INSERT INTO seals (number, text, sha256, prev, key_id, signature, cause, made_at, chains, leaves) VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?)",
        [row.number, row.text, row.sha256, row.prev, row.keyId, row.signature, row.cause, parseSeal(row.text.toString("utf8"))!.at.slice(0, -1).replace("T", " "), row.chains, row.leaves]));
    }
  });
});

describe("the day's seal", () => {
  const DAY_MS = 86_400_000;
  /** days after the newest seal, so that the test can run again on the same database */
  const later = async (days: number) => new Date(Date.parse(parseSeal((await lastSealRow()).text.toString("utf8"))!.at) + days * DAY_MS).toISOString().replace(/\d{3}Z$/, "$&").replace("Z", "000Z");
  const daily = () => Seal.count({ where: { cause: "daily" } });

  it("is made once a day, however often and by however many it is looked for", async () => {
    await makeDailySeal();
    const before = await daily();
    expect(await makeDailySeal()).toBeNull();
    const tomorrow = await later(1);
    const { won, lost } = await race(times(6, () => () => makeDailySeal(tomorrow)));
    expect(lost).toEqual([]);
    expect(won.filter(Boolean)).toHaveLength(1);
    expect(await daily()).toBe(before + 1);
    expect(await makeDailySeal(tomorrow)).toBeNull();
    const skipped = await makeDailySeal(await later(3));
    expect(parseSeal(skipped!.text)!.prev).toBe(sha256(won.find(Boolean)!.text));
    expect(await daily()).toBe(before + 2);
  });

  it("is not made twice when the clock goes back", async () => {
    expect(await makeDailySeal("2026-01-01T00:00:00.000000Z")).toBeNull();
    const { at: last } = parseSeal((await lastSealRow()).text.toString("utf8"))!;
    expect(parseSeal((await makeSeal(SYSTEM, "bundle")).text)!.at >= last).toBe(true);
  });
});

describe("a seal's mail", () => {
  it("goes to each auditor whose account is open, with the six lines and the signature as they are", async () => {
    const [limited, disabled, ended, future] = [await makeUser("auditor"), await makeUser("auditor"), await makeUser("auditor"), await makeUser("auditor")];
    await User.update({ limited: true }, { where: { id: limited.id } });
    await User.update({ disabledAt: new Date() }, { where: { id: disabled.id } });
    await User.update({ endsAt: new Date(Date.now() - 1000) }, { where: { id: ended.id } });
    await User.update({ endsAt: new Date(Date.now() + 86_400_000) }, { where: { id: future.id } });
    const { number, text, signature, sha256: digest, keyId } = await makeSeal(auditor, "asked");
    const mails = await Mail.findAll({ where: { subject: `Seal ${number} of ${(await import("@/lib/env")).env().workshop}` } });
    const to = mails.map((mail) => mail.recipient);
    expect(to).toEqual(expect.arrayContaining([limited.email, future.email]));
    for (const person of [disabled, ended]) expect(to).not.toContain(person.email);
    expect(new Set(to).size).toBe(to.length);
    for (const mail of mails) {
      const whole = mail.sealed ? openText(mail.id, mail.sealed) : mail.textMasked;
      expect(whole).toContain(`\n${text}`);
      expect(whole.split("\n")).toEqual(expect.arrayContaining([signature, keyId]));
      expect(whole.endsWith(`\nNewest seal of this workshop's logs: ${number}\nSHA-256 ${digest}\n`)).toBe(true);
    }
    const before = await Mail.count();
    await makeSeal(SYSTEM, "bundle");
    expect(await Mail.count()).toBe(before);
  });

  it("follows the day's own seal too", async () => {
    const before = await Mail.count();
    const at = parseSeal((await lastSealRow()).text.toString("utf8"))!.at;
    await makeDailySeal(new Date(Date.parse(at) + 86_400_000).toISOString().replace("Z", "000Z"));
    expect(await Mail.count()).toBeGreaterThan(before);
  });
});

describe("the interface", () => {
  it("makes a seal for lead, auditor and admin, once for a repeated request, and not for a technician", async () => {
    expect(await refusal(makeSeal(technician, "asked"))).toMatchObject({ status: 403 });
    expect((await callAs(technician, askRoute, "/api/seals", { key: "a" })).status).toBe(403);
    const first = await callAs(auditor, askRoute, "/api/seals", { key: "the same" });
    expect(first.status).toBe(201);
    const made = (await first.json()) as { number: number };
    const again = await callAs(auditor, askRoute, "/api/seals", { key: "the same" });
    expect(await again.json()).toEqual(made);
    expect((await newestSeal())!.number).toBe(made.number);
    expect((await callAs(admin, askRoute, "/api/seals", { key: "b" })).status).toBe(201);
  });

  it("are refused to one person who asks for them on and on, and are there for others", async () => {
    const [eager, other] = [await makeUser("auditor"), await makeUser("auditor")];
    for (let i = 0; i < SEALS_AN_HOUR_PER_PERSON; i += 1) await askForSeal(eager);
    const newest = (await newestSeal())!.number;
    const refused = await callAs(eager, askRoute, "/api/seals", { key: "one more" });
    expect(refused.status).toBe(429);
    expect(Number(refused.headers.get("retry-after"))).toBeGreaterThan(3000);
    expect(((await refused.json()) as { detail: string }).detail).toMatch(/^You have asked for 20 seals within the last hour, .* ask again in (59|60) min\.$/);
    expect((await newestSeal())!.number).toBe(newest);
    expect((await askForSeal(other)).number).toBe(newest + 1);
  });

  it("lists seals and hands out each one's three files", async () => {
    const { number, text, signature, keyId } = await makeSeal(auditor, "asked");
    expect(await refusal(sealList(technician, { page: 1, pageSize: 5 }))).toMatchObject({ status: 403 });
    const list = (await (await callAs(auditor, listRoute, "/api/seals?pageSize=2")).json()) as { items: { number: number; prev: string; sha256: string }[]; total: number };
    expect(list.items.map((item) => item.number)).toEqual([number, number - 1]);
    expect(list.items[0].prev).toBe(list.items[1].sha256);
    const one = (await (await callAs(auditor, sealRoute, `/api/seals/${number}`, { params: { number: String(number) } })).json()) as SealView;
    expect(one).toMatchObject({ number, text, signature, keyId, signed: true, cause: "asked" });
    const file = async (name: string) => callAs(auditor, sealRoute, `/api/seals/${number}?file=${name}`, { params: { number: String(number) } });
    const [sealTxt, sealSig, keyPem] = [await file("text"), await file("signature"), await file("key")];
    expect([sealTxt, sealSig, keyPem].map((r) => r.headers.get("content-disposition"))).toEqual(["seal.txt", "seal.sig", "seal-key.pem"].map((name) => `attachment; filename="${name}"`));
    expect(opensslAccepts(Buffer.from(await sealTxt.arrayBuffer()), Buffer.from(await sealSig.arrayBuffer()), await keyPem.text())).toBe(true);
    expect((await file("everything")).status).toBe(422);
    for (const odd of ["0", "-1", "1e3", "999999999", "a", "01"]) expect((await refusal(sealByNumber(auditor, odd))).status).toBe(404);
  });

  it("proves a drive's place in a seal to whoever may read its log", async () => {
    const { number } = await makeSeal(auditor, "asked");
    const response = await callAs(technician, proofRoute, `/api/drives/${chip.driveId}/proof?seal=${number}`, { params: { id: chip.driveId } });
    const { seal, proof } = (await response.json()) as DriveProofView;
    expect(seal.number).toBe(number);
    expect(proof).toMatchObject({ format: "twinread-proof/1", seal: number });
    expect(proofHolds(parseSeal(seal.text)!, proof.proofs[0], (bytes) => createHash("sha256").update(bytes).digest())).toBe(true);
    const elsewhere: Actor = { ...auditor, cases: [] };
    expect((await refusal(driveProof(elsewhere, chip.driveId))).status).toBe(404);
    expect((await driveProof({ ...auditor, cases: [chip.caseId] }, chip.driveId)).proof.proofs[0].drive).toBe(chip.driveId);
    const young = await makeChip(technician);
    expect((await refusal(driveProof(auditor, young.driveId, number))).detail).toContain("it was recorded later");
    expect((await refusal(driveProof(auditor, young.driveId, 4_000_000))).status).toBe(404);
  });
});
