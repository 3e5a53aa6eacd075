import { randomUUID } from "node:crypto";
import { simpleParser } from "mailparser";
import { QueryTypes } from "sequelize";
import { SMTPServer } from "smtp-server";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { approveImage } from "@/lib/commands/approve-image";
import { deliverMails, MAX_TRIES, waitSeconds } from "@/lib/commands/deliver-mails";
import { noteOpened } from "@/lib/commands/note-opened";
import { queueMail } from "@/lib/commands/queue-mail";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { retryMail } from "@/lib/commands/retry-mail";
import { sendSummary } from "@/lib/commands/send-summary";
import { withdrawShare } from "@/lib/commands/withdraw-share";
import type { Actor } from "@/lib/core/words";
import { sealText as textOfSeal } from "@/lib/core/seal";
import { newestSealIn, sealMailText, withNewestSeal } from "@/lib/mail/seal-text";
import { openText, sealText } from "@/lib/mail/sealed-text";
import { mailSender, type OutgoingMail } from "@/lib/mail/transport";
import { chainEntries, checkCustody } from "@/lib/queries/custody";
import { mailList } from "@/lib/queries/mails";
import { summaryByToken } from "@/lib/queries/summary";
import { connection, inTransaction, Mail, Seal, Share } from "@/models";
import { logKey } from "@/storage";
import { type MadeChip, makeChip, makeReady, makeUser, sha256, store, firmware } from "../support/factory";

const SECRET = "https://bench.example/summary/AAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAA";
/** the last lines of every mail, once there is a seal */
const NEWEST = "(\\n\\nNewest seal of this workshop's logs: \\d+\\nSHA-256 [0-9a-f]{64}\\n)?";
const list = { q: "", sort: "", order: "asc" as const, page: 1, pageSize: 50 };

async function queue(to = `${randomUUID()}@customer.example`): Promise<{ id: string; to: string }> {
  const { id } = await inTransaction((tx) => queueMail(tx, { to, subject: "A subject, größer", text: `Open ${SECRET}`, maskedText: "Open (hidden)" }));
  return { id, to };
}
const row = async (id: string) => (await Mail.findByPk(id))!;
const due = (id: string) => connection().query("UPDATE mails SET next_attempt_at = UTC_TIMESTAMP(6) WHERE id = ?", { replacements: [id] });
const expireLease = (id: string) => connection().query("UPDATE mails SET leased_until = UTC_TIMESTAMP(6) - INTERVAL 1 SECOND WHERE id = ?", { replacements: [id] });

/** Keeps what it was given, and treats mails of other tests as sent. */
function keeper(trouble?: (mail: OutgoingMail) => Error | null) {
  const got: OutgoingMail[] = [];
  return {
    got,
    send: async (mail: OutgoingMail) => {
      const error = trouble?.(mail);
      if (error) throw error;
      got.push(mail);
    },
  };
}

describe("a mail's text", () => {
  it("opens under its own id only, and not after a change", () => {
    const sealed = sealText("a", "secret");
    expect(openText("a", sealed)).toBe("secret");
    expect(() => openText("b", sealed)).toThrow();
    sealed[sealed.length - 1] ^= 1;
    expect(() => openText("a", sealed)).toThrow();
  });
});

describe("the outbox", () => {
  // what other tests have left queued would stand in front
  beforeAll(async () => {
    while ((await deliverMails(() => Promise.resolve())).sent > 0);
  });

  it("sends with the full text, then wipes it", async () => {
    const { id, to } = await queue();
    const before = await row(id);
    expect(before.sealed!.includes(Buffer.from("summary"))).toBe(false);
    const { got, send } = keeper();
    await deliverMails(send);
    expect(got.filter((m) => m.to === to)).toEqual([{ id, to, subject: "A subject, größer", text: expect.stringMatching(new RegExp(`^Open ${SECRET}${NEWEST}$`)) as string }]);
    expect(await row(id)).toMatchObject({ state: "sent", sealed: null, attempts: 1, textMasked: expect.stringMatching(new RegExp(`^Open \\(hidden\\)${NEWEST}$`)) as string, lastError: null });
    await deliverMails(send);
    expect(got.filter((m) => m.to === to)).toHaveLength(1);
  });

  it("does not queue what was rolled back", async () => {
    let id = "";
    await expect(inTransaction(async (tx) => {
      ({ id } = await queueMail(tx, { to: "a@b.example", subject: "s", text: "t", maskedText: "t" }));
      throw new Error("stop");
    })).rejects.toThrow("stop");
    expect(await Mail.findByPk(id)).toBeNull();
  });

  it("sends each mail once with several workers side by side", async () => {
    const mails = await Promise.all(Array.from({ length: 12 }, () => queue()));
    const { got, send } = keeper();
    await Promise.all(Array.from({ length: 4 }, () => deliverMails(send)));
    for (const { to } of mails) expect(got.filter((m) => m.to === to)).toHaveLength(1);
  });

  it("waits longer after each try and gives up after eight; the admin gives it another chance", async () => {
    const { id, to } = await queue();
    const { send } = keeper((m) => (m.to === to ? Object.assign(new Error(`451 later ${"x".repeat(43)}`), { code: "EENVELOPE", responseCode: 451 }) : null));
    for (let attempt = 1; attempt <= MAX_TRIES; attempt += 1) {
      expect((await row(id)).state).toBe("queued");
      await due(id);
      await deliverMails(send);
      expect((await row(id)).attempts).toBe(attempt);
    }
    expect(await row(id)).toMatchObject({ state: "dead", lastError: "451 later …" });
    expect((await row(id)).sealed).not.toBeNull();
    const admin = await makeUser("admin");
    const lead = await makeUser("lead");
    await expect(retryMail(lead, id)).rejects.toMatchObject({ code: "forbidden" });
    expect((await retryMail(admin, id)).mail).toMatchObject({ state: "queued", attempts: 0 });
    await expect(retryMail(admin, id)).rejects.toMatchObject({ code: "rule-against" });
    const { got, send: better } = keeper();
    await deliverMails(better);
    expect(got.some((m) => m.to === to)).toBe(true);
    await expect(retryMail(admin, id)).rejects.toMatchObject({ code: "rule-against" });
  });

  it("does not try at once again, and doubles the wait", async () => {
    const { id, to } = await queue();
    const { send } = keeper((m) => (m.to === to ? new Error("refused") : null));
    await deliverMails(send);
    await deliverMails(send);
    expect((await row(id)).attempts).toBe(1);
    const [{ wait }] = await connection().query<{ wait: number }>("SELECT TIMESTAMPDIFF(SECOND, UTC_TIMESTAMP(6), next_attempt_at) AS wait FROM mails WHERE id = ?", { replacements: [id], type: QueryTypes.SELECT });
    expect(Number(wait)).toBeGreaterThan(15);
    expect([1, 2, 3, 8].map((n) => waitSeconds(n, 0.5))).toEqual([30, 60, 120, 3600]);
    expect([waitSeconds(1, 0), waitSeconds(1, 1)]).toEqual([23, 38]);
  });

  it("gives up at once on a mailbox that does not exist", async () => {
    const { id, to } = await queue();
    const { send } = keeper((m) => (m.to === to ? Object.assign(new Error("550 no such mailbox"), { code: "EENVELOPE", responseCode: 550 }) : null));
    await deliverMails(send);
    expect(await row(id)).toMatchObject({ state: "dead", attempts: 1 });
  });

  it("sends again what a dead server was sending, says that it may be there twice, and ignores the late one", async () => {
    const { id, to } = await queue();
    let release = () => {};
    const hanging = deliverMails(async (mail) => {
      if (mail.to !== to) return;
      await new Promise<void>((done) => (release = done));
      throw new Error("late trouble");
    });
    while ((await row(id)).state !== "sending") await new Promise((done) => setTimeout(done, 20));
    const { got, send } = keeper();
    await deliverMails(send);
    expect(got.some((m) => m.to === to)).toBe(false);
    await expireLease(id);
    await deliverMails(send);
    expect(got.filter((m) => m.to === to)).toHaveLength(1);
    release();
    await hanging;
    const after = await row(id);
    expect(after).toMatchObject({ state: "sent", attempts: 2, possibleDuplicate: true });
    expect(after.lastError).toContain("twice");
  });

  it("is read by the admin alone, without secrets", async () => {
    const { to } = await queue();
    const admin = await makeUser("admin");
    const page = await mailList(admin, { ...list, q: to });
    expect(page).toMatchObject({ total: 1 });
    expect(JSON.stringify(page)).not.toContain("AAAAAAAA");
    await expect(mailList(await makeUser("lead"), list)).rejects.toMatchObject({ code: "forbidden" });
  });
});

describe("the mail server's side", () => {
  const arrived: string[] = [];
  const server = new SMTPServer({
    authOptional: true, disabledCommands: ["STARTTLS"], logger: false,
    onRcptTo: (address, _session, done) => done(address.address.startsWith("gone") ? Object.assign(new Error("no such mailbox"), { responseCode: 550 }) : undefined),
    onData: (data, _session, done) => {
      const parts: Buffer[] = [];
      data.on("data", (part: Buffer) => parts.push(part));
      data.on("end", () => done(void arrived.push(Buffer.concat(parts).toString()) as undefined));
    },
  });
  let port = 0;
  beforeAll(async () => {
    await new Promise<void>((done) => server.listen(0, "127.0.0.1", done));
    port = (server.server.address() as { port: number }).port;
  });
  afterAll(() => new Promise<void>((done) => server.close(done)));
  const sender = () => mailSender({ host: "127.0.0.1", port, secure: false, user: null, password: null, from: "desk@bench.example", fake: true }, "https://bench.example", "Größer Bench");

  it("gets the whole link, the outbox's id as Message-ID and no extra header", async () => {
    await sender()({ id: "42", to: "a@customer.example", subject: "Größe\r\nBcc: b@customer.example", text: `Link\n${SECRET}\n` });
    const mail = await simpleParser(arrived.at(-1)!);
    expect(mail.text).toContain(SECRET);
    expect(mail.messageId).toBe("<42@bench.example>");
    expect(mail.headers.has("bcc")).toBe(false);
  });

  it("gets the newest seal as a header and as the last lines, and a seal's lines unbroken", async () => {
    const seal = textOfSeal({ number: 41, at: "2026-11-03T09:14:05.123456Z", chains: 3, root: "ab".repeat(32), prev: "cd".repeat(32) });
    const signature = Buffer.alloc(64, 0xfb).toString("base64");
    const text = withNewestSeal(sealMailText({ workshop: "Größer Bench", number: 41, text: seal, signature, keyId: "ef".repeat(32), sha256: "12".repeat(32) }), { number: 41, sha256: "12".repeat(32) });
    await sender()({ id: "43", to: "a@auditor.example", subject: "Seal 41", text });
    const mail = await simpleParser(arrived.at(-1)!);
    expect(mail.headers.get("x-twinread-seal")).toBe(`41 ${"12".repeat(32)}`);
    expect(mail.text).toContain(`\n${seal}`);
    expect(mail.text!.split("\n")).toContain(signature);
    expect(mail.text!.trimEnd().endsWith(`Newest seal of this workshop's logs: 41\nSHA-256 ${"12".repeat(32)}`)).toBe(true);
    await sender()({ id: "44", to: "a@customer.example", subject: "s", text: "before the first seal\n" });
    expect((await simpleParser(arrived.at(-1)!)).headers.has("x-twinread-seal")).toBe(false);
  });

  it("is believed when it refuses for good", async () => {
    const { id, to } = await queue(`gone-${randomUUID()}@customer.example`);
    await deliverMails((mail) => (mail.to === to ? sender()(mail) : Promise.resolve()));
    expect(await row(id)).toMatchObject({ state: "dead", attempts: 1 });
  });
});

describe("the verification summary", () => {
  let technician: Actor;
  let lead: Actor;
  let chip: MadeChip;
  const image = firmware(`summary-image ${randomUUID()}`, 8192);

  beforeAll(async () => {
    technician = await makeUser("technician", "Nell Farrow");
    lead = await makeUser("lead", "Ida Brandt");
    chip = await makeChip(technician);
    await makeReady(technician, chip, image);
  });

  it("waits until each chip that needs transfer is verified", async () => {
    await expect(sendSummary(lead, chip.caseId)).rejects.toMatchObject({ code: "rule-against", detail: expect.stringContaining("U12 of Drive A") as string });
    await expect(sendSummary(technician, chip.caseId)).rejects.toMatchObject({ code: "forbidden" });
    expect(await Share.count({ where: { caseId: chip.caseId } })).toBe(0);
  });

  it("goes out with a private link, opens, is noted once, and ends when it is withdrawn", async () => {
    const approval = await approveImage(lead, chip.chipId, { sha256: sha256(image), donorChipId: chip.donorChipId, statement: "Three clean reads.", reasons: {}, lookedAt: [] });
    await recordTransfer(technician, approval.id, { kind: "write", donorChipId: chip.donorChipId });
    for (const seating of [1, 2]) await store(technician, chip.donorChipId, "after", image, seating);
    const { share } = await sendSummary(lead, chip.caseId);
    expect(share.email).toBe("desk@lindmoor.example");
    const { got, send } = keeper();
    await deliverMails(send);
    const mail = got.find((m) => m.subject.endsWith(chip.ref))!;
    const token = /\/summary\/([A-Za-z0-9_-]{43})\n/.exec(mail.text)![1];
    const sentEntry = (await chainEntries(chip.driveId)).find((e) => e.action === "summary.sent")!;
    expect(mail.text).toContain(`entry ${sentEntry.seq}\n${sentEntry.hash}`);
    expect(mail.text).toContain(logKey().keyId);
    const seal = (await Seal.findOne({ where: { cause: "summary" }, order: [["number", "DESC"]] }))!;
    expect(seal.leaves.toString("utf8")).toContain(`{"drive":"${chip.driveId}","head":"${sentEntry.hash}","seq":${sentEntry.seq}}\n`);
    expect(mail.text).toContain(`${seal.sha256.toString("hex")}\n${seal.keyId}\n`);
    expect(newestSealIn(mail.text)).toEqual({ number: seal.number, sha256: seal.sha256.toString("hex") });
    const kept = (await row(mail.id)).textMasked;
    expect(kept).not.toContain(token);
    expect(kept).toContain("(private link, hidden)");
    expect(JSON.stringify(await Share.findAll({ where: { caseId: chip.caseId } }))).not.toContain(token);

    const view = (await summaryByToken(token))!;
    expect(view).toMatchObject({ caseRef: chip.ref, customerName: "Lindmoor Veterinary Practice", twoPersonRule: true });
    expect(view.drives[0].head).toEqual({ seq: sentEntry.seq, hash: sentEntry.hash });
    expect(view.seal).toEqual({ number: seal.number, sha256: seal.sha256.toString("hex"), keyId: seal.keyId });
    expect(view.drives[0].chips).toEqual([expect.objectContaining({ verified: true, sha256: sha256(image), agreeingReads: 3, seatings: 2, readBacks: 2, approvedBy: "Ida Brandt", transferKind: "write" })]);
    expect(view.drives[0].chips[0].cells).toHaveLength(256);
    expect(JSON.stringify(view)).not.toMatch(/Nell Farrow|bench\.example/);
    expect(await summaryByToken("A".repeat(43))).toBeNull();
    expect(await summaryByToken(`${token.slice(0, 42)}`)).toBeNull();

    await Promise.all([noteOpened(token), noteOpened(token)]);
    await noteOpened(token);
    expect((await chainEntries(chip.driveId)).filter((e) => e.action === "summary.opened")).toHaveLength(1);
    expect((await summaryByToken(token))!.drives[0].head.seq).toBe(sentEntry.seq);

    await expect(withdrawShare(technician, share.id)).rejects.toMatchObject({ code: "forbidden" });
    expect((await withdrawShare(lead, share.id)).share.withdrawnAt).not.toBeNull();
    await withdrawShare(lead, share.id);
    expect(await summaryByToken(token)).toBeNull();
    await expect(noteOpened(token)).rejects.toMatchObject({ code: "not-found" });
    expect((await chainEntries(chip.driveId)).filter((e) => e.action === "share.withdrawn")).toHaveLength(1);
    expect((await checkCustody(chip.driveId)).findings).toEqual([]);
    expect(JSON.stringify((await chainEntries(chip.driveId)).map((e) => e.body))).not.toMatch(/Lindmoor|desk@/);
  });
});
