import { randomBytes, randomUUID } from "node:crypto";
import sharp from "sharp";
import { afterEach, beforeAll, describe, expect, it, vi } from "vitest";
import { POST as deletion } from "@/app/api/requests/deletion/route";
import { POST as post } from "@/app/api/requests/route";
import { changePolicy } from "@/lib/commands/change-policy";
import { requestTransfer } from "@/lib/commands/request-transfer";
import { renewRequestLink } from "@/lib/commands/renew-request-link";
import { addressDigest, formStamp } from "@/lib/commands/request-secrets";
import { withdrawRequest } from "@/lib/commands/withdraw-request";
import { withdrawRequestLink } from "@/lib/commands/withdraw-request-link";
import { askDeletion } from "@/lib/commands/ask-deletion";
import { parseCaseRef } from "@/lib/core/case-number";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { env } from "@/lib/env";
import { REQUEST_TRIES_AN_HOUR, REQUESTS_AN_HOUR, REQUESTS_AN_HOUR_PER_ADDRESS } from "@/lib/limits";
import { openText } from "@/lib/mail/sealed-text";
import { requestAnswers } from "@/lib/schemas/request";
import { caseList } from "@/lib/queries/cases";
import { chainEntries, checkCustody } from "@/lib/queries/custody";
import { shareHash } from "@/lib/queries/open-share";
import { currentPolicy } from "@/lib/queries/policy";
import { requestPage, requestSection, requestSlip } from "@/lib/queries/requests";
import { Case, Customer, CustodyEntry, IdempotencyKey, Mail, Photo, Request as Row } from "@/models";
import { lastEntry, logOf, makeUser, refusalOf } from "../support/factory";
import { answers } from "../support/request";

let technician: Actor;
let lead: Actor;
let admin: Actor;
beforeAll(async () => {
  [technician, lead, admin] = [await makeUser("technician"), await makeUser("lead"), await makeUser("admin")];
});
afterEach(() => vi.useRealTimers());

/** An address that no other test sends from. */
const freshAddress = () => `2001:db8:${randomBytes(2).toString("hex")}:${randomBytes(2).toString("hex")}::1`;
const oldStamp = () => formStamp(Date.now() - 60_000);

interface Sending {
  fields?: Record<string, unknown>;
  files?: { bytes: Uint8Array<ArrayBuffer>; name: string }[];
  from?: string;
  key?: string;
  stamp?: string;
  headers?: Record<string, string>;
}

async function sendRequest({ fields = {}, files = [], from = freshAddress(), key, stamp = oldStamp(), headers = {} }: Sending = {}): Promise<{ status: number; body: Record<string, string> & { errors?: { path: string; message: string }[] }; headers: Headers }> {
  const form = new FormData();
  for (const [name, value] of Object.entries({ ...answers(fields), stamp })) if (value !== undefined) form.set(name, String(value));
  for (const file of files) form.append("file", new File([file.bytes], file.name));
  const response = await post(new Request(`${env().publicUrl}/api/requests`, {
    method: "POST", body: form, headers: { "sec-fetch-site": "same-origin", "x-forwarded-for": from, ...(key ? { "idempotency-key": key } : {}), ...headers },
  }));
  return { status: response.status, body: await response.json() as Record<string, string>, headers: response.headers };
}

async function made(sending: Sending = {}): Promise<{ token: string; found: Case; row: Row; refChecked: string }> {
  const { status, body } = await sendRequest(sending);
  expect(body.detail, JSON.stringify(body)).toBeUndefined();
  expect(status).toBe(201);
  const found = (await Case.findOne({ where: { ref: body.ref } }))!;
  return { token: body.link.slice(-43), found, row: (await Row.findOne({ where: { caseId: found.id } }))!, refChecked: body.refChecked };
}
const picture = async (colour: string) => new Uint8Array(await sharp({ create: { width: 64, height: 48, channels: 3, background: colour } }).jpeg().toBuffer());
const mailsOf = (email: string) => Mail.findAll({ where: { recipient: email }, order: ["queuedAt"] });

describe("a request", () => {
  it("makes customer, case, answers, photos, entry and mails in one step", async () => {
    const email = `${randomUUID()}@customer.example`;
    const { token, found, row, refChecked } = await made({ fields: { email }, files: [{ bytes: await picture("#203040"), name: "board.jpg" }] });
    expect(parseCaseRef(refChecked)).toBe(found.ref);
    expect(found).toMatchObject({ receivedAt: null, createdBy: null, damage: "Power surge or lightning: Smell of burning after a storm." });
    expect(found.requestedAt).not.toBeNull();
    expect(await Customer.findByPk(found.customerId)).toMatchObject({ name: "Edda Finch", company: "Harrow & Finch Surveyors", returnAddress: "3 Mill Row\nFennick ZZ0 4AA", email });
    expect(JSON.parse(row.answers)).toMatchObject({ partNumber: "PN 4471-0093-B", keepDays: 90, consentSolder: "yes", model: null });
    expect(await Photo.count({ where: { caseId: found.id, byUserId: null } })).toBe(1);
    expect(await lastEntry(WORKSHOP_CHAIN, "request.received")).toEqual({ caseRef: found.ref, request: row.id, damage: "Power surge or lightning", consents: ["owner", "read", "write", "solder"], photos: 1 });
    expect((await lastEntry(WORKSHOP_CHAIN, "photo.added"))?.by).toBe("customer");
    const [mail, ...more] = await mailsOf(email);
    expect(more).toEqual([]);
    expect(mail).toMatchObject({ kind: "request-customer", subject: `Your request, case ${refChecked}` });
    expect(openText(mail.id, mail.sealed!)).toContain(`${env().publicUrl}/request/${token}`);
    expect(mail.textMasked).toContain("(private link, hidden)");
    const desk = (await Mail.findAll({ where: { kind: "request-desk" } })).filter((one) => one.subject.includes(refChecked));
    expect(desk.map((one) => one.recipient)).toEqual([env().workshopContact.email]);
  });

  it("leaves the secret of its link nowhere, and no person in the log", async () => {
    const email = `${randomUUID()}@customer.example`;
    const { token, row } = await made({ fields: { email, name: "Ottoline Quill", signature: "Ottoline Quill" }, key: randomUUID() });
    expect(row.tokenHash.equals(shareHash(token))).toBe(true);
    const dump = JSON.stringify([await Row.findAll(), await IdempotencyKey.findAll(), (await Mail.findAll({ where: { recipient: email } })).map((mail) => [mail.textMasked, mail.sealed?.toString("latin1")])]);
    expect(dump).not.toContain(token);
    const log = (await CustodyEntry.findAll({ where: { chainId: WORKSHOP_CHAIN } })).map((entry) => entry.body.toString("utf8")).join("\n");
    for (const secret of [token, email, "Ottoline", "Mill Row", "Smell of burning"]) expect(log).not.toContain(secret);
  });

  it("is one request, however often it is sent with one key", async () => {
    const [key, from, email] = [randomUUID(), freshAddress(), `${randomUUID()}@customer.example`];
    const files = [{ bytes: await picture("#904010"), name: "a.jpg" }];
    const first = await sendRequest({ key, from, fields: { email }, files });
    const again = await sendRequest({ key, from, fields: { email }, files, stamp: formStamp(Date.now() - 30_000) });
    expect(again).toMatchObject({ status: 201, body: first.body });
    expect(await mailsOf(email)).toHaveLength(1);
    expect(await Case.count({ where: { ref: first.body.ref } })).toBe(1);
    expect(await requestPage(again.body.link.slice(-43))).not.toBeNull();
    const other = await sendRequest({ key, from, fields: { email, happened: "Something else." }, files });
    expect(other).toMatchObject({ status: 422 });
    expect((await sendRequest({ key: "short", from })).status).toBe(400);
  });

  it("gets a number of its own when many come at once", async () => {
    const all = await Promise.all(Array.from({ length: 8 }, () => made()));
    expect(new Set(all.map((one) => one.found.ref)).size).toBe(8);
    expect(new Set(all.map((one) => one.token)).size).toBe(8);
  });

  it("keeps hostile text as text", async () => {
    const nasty = "<script>alert(1)</script> & \"'`;-- ${7*7} {{x}}";
    const { token, found } = await made({ fields: { name: nasty, company: nasty, returnAddress: nasty, happened: nasty, tried: nasty, signature: nasty, partNumber: nasty.slice(0, 100) } });
    expect((await requestPage(token))!.answers.name).toBe(nasty);
    expect((await requestSection(technician, found.id))!.answers.tried).toBe(nasty);
  });
});

describe("what isn't taken", () => {
  const cases = async () => Case.count();
  it.each<[string, Record<string, unknown>, string]>([
    ["no name", { name: "" }, "name"], ["a line break in the name", { name: "Edda\r\nBcc: x@y.example" }, "name"], ["a header in the address", { email: "a@b.example\r\nBcc: c@d.example" }, "email"],
    ["two addresses", { email: "a@b.example, c@d.example" }, "email"], ["NUL in what happened", { happened: "a\0b" }, "happened"], ["a part number of 4 KB", { partNumber: "9".repeat(4096) }, "partNumber"],
    ["a return address of 4 KB", { returnAddress: "x".repeat(4096) }, "returnAddress"], ["a turned direction", { company: "\u202egnp.exe" }, "company"], ["no leave to write", { consentWrite: "" }, "consentWrite"],
    ["no number of the drive", { partNumber: "", serial: "", model: "" }, "partNumber"], ["no board number", { boardNumber: "" }, "boardNumber"], ["days that nobody agreed to", { keepDays: "3650" }, "consentRead"],
    ["a field filled by a program", { website: "https://spam.example" }, "website"],
  ])("%s", async (_, fields, path) => {
    const before = await cases();
    const { status, body } = await sendRequest({ fields });
    expect(status, JSON.stringify(body)).toBe(422);
    expect(body.errors!.map((error) => error.path)).toContain(path);
    expect(await cases()).toBe(before);
  });

  it("a form that no page made, an old one, and one filled in a blink", async () => {
    const before = await cases();
    for (const stamp of ["", "x.y", `${formStamp().slice(0, -1)}!`, formStamp(Date.now() - 49 * 3_600_000), formStamp(Date.now() + 600_000)]) expect((await sendRequest({ stamp })).status, stamp).toBe(422);
    const quick = await sendRequest({ stamp: formStamp() });
    expect(quick.status).toBe(429);
    expect(Number(quick.headers.get("retry-after"))).toBeGreaterThan(0);
    expect(await cases()).toBe(before);
  });

  it("a call from another site, one that is no form, an unknown field, a field twice", async () => {
    expect((await sendRequest({ headers: { "sec-fetch-site": "cross-site" } })).status).toBe(403);
    const json = await post(new Request(`${env().publicUrl}/api/requests`, { method: "POST", body: "{}", headers: { "content-type": "application/json", "sec-fetch-site": "same-origin", "x-forwarded-for": freshAddress() } }));
    expect(json.status).toBe(415);
    expect((await sendRequest({ fields: { receivedAt: "2026-01-01" } })).status).toBe(422);
    const form = new FormData();
    for (const [name, value] of Object.entries({ ...answers(), stamp: oldStamp() })) form.set(name, String(value));
    form.append("name", "Another");
    const twice = await post(new Request(`${env().publicUrl}/api/requests`, { method: "POST", body: form, headers: { "sec-fetch-site": "same-origin", "x-forwarded-for": freshAddress() } }));
    expect(twice.status).toBe(422);
  });

  it("nine photos, a file that is no photo, and one too large", async () => {
    const before = await cases();
    const nine = await Promise.all(Array.from({ length: 9 }, async (_, i) => ({ bytes: await picture(`#0000${i}${i}`), name: `${i}.jpg` })));
    expect((await sendRequest({ files: nine })).status).toBe(400);
    const svg = new Uint8Array(Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>'));
    expect([415, 422]).toContain((await sendRequest({ files: [{ bytes: svg, name: "board.jpg" }] })).status);
    expect((await sendRequest({ files: [{ bytes: new Uint8Array(21 * 1024 * 1024), name: "huge.jpg" }] })).status).toBe(413);
    expect(await cases()).toBe(before);
  });
});

describe("limits", () => {
  it(`hold at ${REQUESTS_AN_HOUR_PER_ADDRESS} requests an hour from one address, exactly, also at once`, async () => {
    const from = freshAddress();
    const one = () => requestTransfer(requestAnswers.parse(answers()), [], { token: randomBytes(32).toString("base64url"), address: addressDigest(from) });
    const results = await Promise.allSettled(Array.from({ length: REQUESTS_AN_HOUR_PER_ADDRESS + 4 }, one));
    expect(results.filter((result) => result.status === "fulfilled")).toHaveLength(REQUESTS_AN_HOUR_PER_ADDRESS);
    const later = await sendRequest({ from: from.replace(/::1$/, "::2") });
    expect(later.status).toBe(429);
    expect(later.body.detail).toContain(`phone us: ${env().workshopContact.phone}`);
    expect(Number(later.headers.get("retry-after"))).toBeGreaterThan(3000);
    expect((await sendRequest({ from: freshAddress() })).status).toBe(201);
    vi.useFakeTimers({ toFake: ["Date"], now: Date.now() + 61 * 60_000 });
    expect((await sendRequest({ from })).status).toBe(201);
  }, 60_000);

  it("let a few calls from one address be under way at once", async () => {
    const from = freshAddress();
    const results = await Promise.all(Array.from({ length: 6 }, () => sendRequest({ from })));
    expect(new Set(results.map((one) => one.status))).toEqual(new Set([201, 429]));
    expect((await sendRequest({ from })).status).toBe(201);
  });

  it(`count tries that were refused, up to ${REQUEST_TRIES_AN_HOUR}`, async () => {
    const from = freshAddress();
    for (let i = 0; i < REQUEST_TRIES_AN_HOUR; i += 1) expect((await sendRequest({ from, fields: { name: "" } })).status).toBe(422);
    expect((await sendRequest({ from })).status).toBe(429);
  });

  it(`hold at ${REQUESTS_AN_HOUR} requests an hour from everywhere`, async () => {
    // a day on, so that no other test's requests count
    vi.useFakeTimers({ toFake: ["Date"], now: Date.now() + 24 * 3_600_000 });
    for (let i = 0; i < REQUESTS_AN_HOUR; i += 1) expect((await sendRequest()).status).toBe(201);
    const { status, body } = await sendRequest();
    expect(status).toBe(429);
    expect(body.detail).toMatch(/^Very many requests/);
  }, 120_000);
});

describe("the private page", () => {
  it("shows the case to who has the link, and to nobody else", async () => {
    const { token, refChecked } = await made();
    expect(await requestPage(token)).toMatchObject({ refChecked, photos: 0, slip: true, withdraws: true, deletion: null, ends: null });
    expect((await requestSlip(token))!.refChecked).toBe(refChecked);
    for (const other of ["", "x", token.slice(1), `${token}A`, randomBytes(32).toString("base64url"), `${token.slice(0, 42)}!`, "../../etc"]) {
      expect(await requestPage(other)).toBeNull();
      expect(await requestSlip(other)).toBeNull();
    }
  });

  it("asks the customer's question while the case waits for the customer", async () => {
    const { token, found } = await made();
    await found.update({ holdReason: "Is the small board still there?", waitingFor: "customer", waitingSince: new Date() });
    expect((await requestPage(token))!.state).toMatchObject({ step: "question", question: "Is the small board still there?" });
    await found.update({ waitingFor: "donor" });
    expect(JSON.stringify(await requestPage(token))).not.toContain("small board still");
  });

  it("ends some days after the case was closed", async () => {
    const { token, found } = await made();
    const { shareDays } = await currentPolicy();
    await found.update({ closedAt: new Date(Date.now() - (shareDays - 1) * 86_400_000), closedKind: "cancelled" });
    expect((await requestPage(token))!.ends).not.toBeNull();
    await found.update({ closedAt: new Date(Date.now() - shareDays * 86_400_000 - 1000) });
    expect(await requestPage(token)).toBeNull();
  });

  it("takes a request back while the parcel isn't there", async () => {
    const { token, found } = await made();
    await withdrawRequest(token);
    await found.reload();
    expect(found).toMatchObject({ closedKind: "cancelled", closedReason: "Withdrawn by the customer before the parcel came" });
    expect(found.eraseOn).toMatch(/^\d{4}-\d\d-\d\d$/);
    expect((await requestPage(token))!.state.title).toBe("You have withdrawn this request.");
    expect(await lastEntry(WORKSHOP_CHAIN, "case.closed")).toMatchObject({ caseRef: found.ref, kind: "cancelled", unverified: [] });
    expect(await refusalOf(withdrawRequest(token))).toMatchObject({ code: "rule-against" });
    const here = await made();
    await here.found.update({ receivedAt: new Date() });
    expect((await refusalOf(withdrawRequest(here.token))).detail).toMatch(/^Your parcel is here already/);
    expect((await refusalOf(withdrawRequest("x".repeat(43)))).code).toBe("not-found");
  });

  it("takes a wish for deletion once, tells the leads and nothing of it to the log", async () => {
    const { token, found, row } = await made();
    await askDeletion(token, "Please delete my photos, too. Ottoline");
    expect((await requestPage(token))!.deletion).not.toBeNull();
    expect(await lastEntry(WORKSHOP_CHAIN, "request.deletion-asked")).toEqual({ caseRef: found.ref, request: row.id });
    const mails = (await Mail.findAll({ where: { kind: "request-deletion" } })).filter((mail) => mail.subject.includes(found.ref));
    expect(mails.map((mail) => mail.recipient)).toContain((lead as Actor & { email: string }).email);
    expect(mails.every((mail) => !mail.textMasked.includes("photos, too"))).toBe(true);
    expect((await requestSection(lead, found.id))!.deletion).toMatchObject({ message: "Please delete my photos, too. Ottoline" });
    expect((await refusalOf(askDeletion(token, null))).code).toBe("rule-against");
    const wrong = await deletion(new Request(`${env().publicUrl}/api/requests/deletion`, { method: "POST", body: JSON.stringify({ token: "x".repeat(43), message: "" }), headers: { "content-type": "application/json", "sec-fetch-site": "same-origin" } }), { params: Promise.resolve({}) });
    expect(wrong.status).toBe(404);
  });
});

describe("at the desk", () => {
  it("a lead sends a new link, and the former one shows nothing", async () => {
    const email = `${randomUUID()}@customer.example`;
    const { token, row, found } = await made({ fields: { email } });
    expect((await refusalOf(renewRequestLink(technician, row.id))).code).toBe("forbidden");
    await renewRequestLink(lead, row.id);
    expect(await requestPage(token)).toBeNull();
    const [, second] = await mailsOf(email);
    const fresh = /\/request\/([\w-]{43})/.exec(openText(second.id, second.sealed!))![1];
    expect(await requestPage(fresh)).toMatchObject({ photos: 0 });
    expect(second.textMasked).not.toContain(fresh);
    expect((await logOf(WORKSHOP_CHAIN)).findLast((entry) => entry.action === "request.link-sent")).toMatchObject({ actor: { id: lead.id }, facts: { caseRef: found.ref } });
    await withdrawRequestLink(lead, row.id);
    expect(await requestPage(fresh)).toBeNull();
    expect((await requestSection(lead, found.id))!.link.works).toBe(false);
    expect((await refusalOf(renewRequestLink(lead, randomUUID()))).code).toBe("not-found");
  });

  it("lists requests by themselves, and searches among them", async () => {
    const { found } = await made({ fields: { name: `Quill ${randomUUID()}` } });
    const list = { q: found.ref, sort: "received", order: "desc" as const, page: 1, pageSize: 5 };
    expect((await caseList(technician, { ...list, state: "requested" })).items).toMatchObject([{ ref: found.ref, state: "requested", receivedAt: null }]);
    for (const state of ["open", "closed"] as const) expect((await caseList(technician, { ...list, state })).total).toBe(0);
    const came = (await caseList(technician, { ...list, q: "", pageSize: 200 })).items.map((row) => row.receivedAt ?? row.requestedAt!);
    expect(came).toEqual([...came].sort().reverse());
  });

  it("refuses a request that named other days than the policy's", async () => {
    const policy = await currentPolicy();
    await changePolicy(admin, { ...policy, secondFactor: false, erasureDays: 30 });
    try {
      const { status, body } = await sendRequest({ fields: { keepDays: "90" } });
      expect(status).toBe(422);
      expect(body.errors).toEqual([{ path: "consentRead", message: expect.stringContaining("30 days, not 90") as string }]);
    } finally {
      await changePolicy(admin, { ...policy, secondFactor: false });
    }
  });

  it("leaves a log that checks out", async () => {
    expect((await chainEntries(WORKSHOP_CHAIN)).length).toBeGreaterThan(3);
    expect((await checkCustody(WORKSHOP_CHAIN)).findings).toEqual([]);
  });
});
