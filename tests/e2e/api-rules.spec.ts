import { expect } from "@playwright/test";
import { approve, chipOf, custodyOf, makePair, makeReady, randomImage, type Ready, store, type Stored, upload } from "./support/bench";
import { changeAccount, makeNewcomerToken } from "./support/newcomers";
import { appUrl, call, done, expectProblem, fromPage, makeToken, tokenOf } from "./support/station";
import { test } from "./support/test";

const UNKNOWN = "0badc0de-0000-4000-8000-00000badc0de";
const CASE = { customer: { name: "API rules", email: "rules@apitests.example" }, damage: "Burnt" };

let mira: string;
let ines: string;
let rhys: string;
let ready: Ready;
test.beforeAll(async () => {
  [mira, ines, rhys] = await Promise.all([tokenOf("mira"), tokenOf("ines"), tokenOf("rhys")]);
  ready = await makeReady(mira, { customer: "API rules" });
});

test.describe("what is sent", () => {
  const post = (body: string, type = "application/json") => call("POST", "/api/cases", { token: mira, body, headers: { "content-type": type } });

  test("refuses JSON that is none", async () => {
    for (const body of ["", "{", "{'a': 1}", "\u0000"]) expectProblem(await post(body), 400, /^The body is not JSON\./);
  });
  test("refuses another content type", async () => {
    for (const type of ["text/plain", "application/x-www-form-urlencoded", "application/jsonp"]) expectProblem(await post(JSON.stringify(CASE), type), 415, /application\/json/);
  });
  test("refuses a body of more than 1 MiB, also when it does not say how long it is", async () => {
    const large = JSON.stringify({ ...CASE, note: "x".repeat(1_100_000) });
    expectProblem(await post(large), 413, /larger than 1 MiB/);
  });
  test("names every field that does not fit, and each that nobody knows", async () => {
    const problem = expectProblem(await post(JSON.stringify({ customer: { name: "", email: "nobody" }, damage: 7, priority: 1 })), 422, /\.$/);
    expect(problem.errors?.map((error) => error.path)).toEqual(expect.arrayContaining(["customer.name", "customer.email", "damage"]));
    expectProblem(await post(JSON.stringify({ ...CASE, priority: 1 })), 422, /priority/);
    expectProblem(await post("[]"), 422, /./);
    expectProblem(await post("null"), 422, /./);
  });
  test("answers 404 to an id that is none, whatever stands there", async () => {
    for (const id of ["1", "U7", `${UNKNOWN}0`, "%00", "..%2f..%2fetc", "' OR 1=1 --"]) {
      const answer = await call("GET", `/api/chips/${id}`, { token: mira });
      expect(answer.status, id).toBe(404);
    }
    expectProblem(await call("GET", "/api/chips/U7", { token: mira }), 404, /Check the link\.$/);
    expectProblem(await call("GET", `/api/chips/${UNKNOWN}`, { token: mira }), 404, /Check the link\.$/);
  });
  test("answers 405 to a method that an address does not take, and tells which it takes", async () => {
    const answer = await call("DELETE", `/api/chips/${ready.chipId}`, { token: ines });
    expectProblem(answer, 405, /^This address takes GET, PATCH only\./);
    expect(answer.headers.get("allow")).toBe("GET, PATCH, HEAD, OPTIONS");
    const options = await call("OPTIONS", "/api/policy");
    expect([options.status, options.headers.get("allow")]).toEqual([204, "GET, PUT, HEAD, OPTIONS"]);
    expect((await call("HEAD", "/api/health")).status).toBe(200);
  });
  test("does not know addresses that nobody made", async () => {
    expectProblem(await call("GET", "/api/drivers", { token: mira }), 404, /no such address/);
  });
});

test.describe("who asks", () => {
  test("a technician approves nothing", async () => {
    const before = (await custodyOf(mira, ready.driveId)).length;
    expectProblem(await approve(mira, ready, ready.sha256), 403, /^Only a lead can approve an image\./);
    expect((await custodyOf(mira, ready.driveId)).length).toBe(before);
  });
  test("an auditor changes nothing", async () => {
    for (const [path, json] of [
      [`/api/chips/${ready.chipId}/approval`, { sha256: ready.sha256, donorChipId: ready.donorChipId, statement: "As an auditor." }],
      [`/api/reads/${ready.reads[0].id}/set-aside`, { reason: "As an auditor." }], ["/api/cases", CASE],
    ] as const) expectProblem(await call("POST", path, { token: rhys, json }), 403, /\.$/);
    expectProblem(await upload(rhys, ready.chipId, {}, [{ bytes: randomImage(16) }]), 403, /auditor/);
    expect(await chipOf(rhys, ready.chipId)).toMatchObject({ state: "ready" });
  });
  test("whoever took a read cannot approve its image, also when it is set aside", async () => {
    const own = await makeReady(mira, { customer: "Two people" });
    const extra = await store(ines, own.chipId, "before", 2, [own.image]);
    const refusal = /^You took a read of this chip, and whoever took one, set aside or not, can’t approve its image\. Ask another lead\.$/;
    expectProblem(await approve(ines, own, own.sha256), 409, refusal);
    await done("POST", `/api/reads/${extra.reads[0].id}/set-aside`, { token: ines, json: { reason: "Taken by the lead." } }, 200);
    expectProblem(await approve(ines, own, own.sha256), 409, refusal);
    expect((await custodyOf(mira, own.driveId)).filter((entry) => entry.action === "approval.refused")).toHaveLength(2);
    expect((await approve(await tokenOf("bram"), own, own.sha256)).status).toBe(201);
  });
  test("an image that is not the agreed one any more is not approved", async () => {
    const chip = await makeReady(mira, { customer: "Changed meanwhile", sizeBytes: 2048 });
    expectProblem(await approve(ines, chip, "0".repeat(64)), 409, /^The agreed image changed meanwhile\./);
    // the reads that the lead looked at are set aside while others take their place
    const image = randomImage(2048);
    for (const read of chip.reads) await done("POST", `/api/reads/${read.id}/set-aside`, { token: mira, json: { reason: "Wrong socket." } }, 200);
    await store(mira, chip.chipId, "before", 3, [image, image]);
    await store(mira, chip.chipId, "before", 4, [image]);
    expectProblem(await approve(ines, chip, chip.sha256), 409, /^The agreed image changed meanwhile\. Open the chip again/);
    expect((await chipOf(mira, chip.chipId)).approvals).toEqual([]);
  });
  test("a link that nobody was given opens nothing", async () => {
    for (const token of ["x".repeat(43), "short", "x".repeat(2000), "..%2f..%2fetc%2fpasswd", UNKNOWN]) {
      expect((await call("GET", `/summary/${token}`)).status, token.slice(0, 60)).toBe(404);
    }
    expectProblem(await call("POST", "/api/shares/opened", { json: { token: "x".repeat(43) }, headers: { origin: appUrl() } }), 404, /\.$/);
  });
  test("a withdrawn token and the token of a disabled user are worth nothing", async () => {
    const person = await makeNewcomerToken("technician");
    const second = await makeToken(person.cookie, "Second bench");
    await done("DELETE", `/api/account/tokens/${second.id}`, fromPage(person.cookie), 200);
    const refused = await call("GET", "/api/bench", { token: second.token });
    expectProblem(refused, 401, /withdrawn/);
    expect(refused.headers.get("www-authenticate")).toMatch(/^Bearer/);
    await done("GET", "/api/bench", { token: person.token });
    await changeAccount(person.id, { disabled: true });
    expectProblem(await call("GET", "/api/bench", { token: person.token }), 401, /switched off\. Ask the admin\.$/);
    expectProblem(await upload(person.token, ready.chipId, {}, [{ bytes: randomImage(16) }]), 401, /switched off/);
    await changeAccount(person.id, { disabled: false });
    await done("GET", "/api/bench", { token: person.token });
    // withdrawing is for the owner alone
    expectProblem(await call("DELETE", `/api/account/tokens/${person.tokenId}`, { token: ines }), 404, /bench token/);
  });
  test("a change with a cookie comes from our own pages or not at all", async () => {
    const { cookie } = await makeNewcomerToken("technician");
    const from = (headers: Record<string, string>) => call("POST", "/api/cases", { cookie, json: CASE, headers });
    const foreign: Record<string, string>[] = [
      {}, { origin: "https://elsewhere.example" }, { origin: "null" }, { "sec-fetch-site": "cross-site", origin: appUrl() }, { "sec-fetch-site": "same-site" },
      { "sec-fetch-site": "none" }, { origin: `${appUrl()}.elsewhere.example` },
    ];
    for (const headers of foreign) expectProblem(await from(headers), 403, /did not come from Twinread's own pages/);
    expectProblem(await call("POST", `/api/chips/${ready.chipId}/reads`, { cookie, body: "x", headers: { origin: "https://elsewhere.example" } }), 403, /own pages/);
    expect((await from({ origin: appUrl() })).status).toBe(201);
    expect((await from({ "sec-fetch-site": "same-origin" })).status).toBe(201);
    // with an Authorization header the cookie counts for nothing
    expectProblem(await call("GET", "/api/bench", { cookie, token: "x".repeat(43) }), 401, /bench token/);
    expectProblem(await call("GET", "/api/bench", { cookie, headers: { authorization: "Basic bWlyYTp4" } }), 401, /bench token/);
  });
});

test.describe("the same request again", () => {
  const key = () => ({ "idempotency-key": crypto.randomUUID() });

  test("gives the same answer and does nothing twice", async () => {
    const headers = key();
    const [first, second] = [await call("POST", "/api/cases", { token: mira, json: CASE, headers }), await call("POST", "/api/cases", { token: mira, json: CASE, headers })];
    expect([first.status, second.status]).toEqual([201, 201]);
    expect(second.bytes.equals(first.bytes)).toBe(true);
    const other = await call("POST", "/api/cases", { token: mira, json: { ...CASE, damage: "Wet" }, headers });
    expectProblem(other, 422, /^This Idempotency-Key was used for another request\./);
    // the key belongs to one user and one route
    const another = await call("POST", "/api/cases", { token: ines, json: CASE, headers });
    expect(another.json<{ id: string }>().id).not.toBe(first.json<{ id: string }>().id);
  });
  test("stores an upload once, also when it comes four times at once", async () => {
    const pair = await makePair(mira, { customer: "Repeated upload", sizeBytes: 1024 });
    const headers = key();
    const bytes = randomImage(1024);
    const answers = await Promise.all([1, 2, 3, 4].map(() => upload(mira, pair.chipId, {}, [{ bytes }], { headers })));
    for (const answer of answers) if (answer.status !== 201) expectProblem(answer, 409, /^The same request is still under way\./);
    const again = await upload(mira, pair.chipId, {}, [{ bytes }], { headers });
    expect(again.status).toBe(201);
    const { reads } = await chipOf(mira, pair.chipId);
    expect(reads).toHaveLength(1);
    expect(again.json<Stored>().reads.map((read) => read.id)).toEqual([reads[0].id]);
    for (const other of [{ fields: { seating: "2" }, bytes }, { fields: {}, bytes: randomImage(1024) }]) {
      expectProblem(await upload(mira, pair.chipId, other.fields as Record<string, string>, [{ bytes: other.bytes }], { headers }), 422, /another request/);
    }
    expect((await custodyOf(mira, pair.driveId)).filter((entry) => entry.action === "read.stored")).toHaveLength(1);
  });
  test("approves once, and what was refused may be asked again under the same key", async () => {
    const headers = key();
    expectProblem(await approve(ines, ready, "0".repeat(64), { headers }), 409, /changed meanwhile/);
    expectProblem(await approve(ines, ready, "0".repeat(64), { headers }), 409, /changed meanwhile/);
    const good = key();
    const [first, second] = [await approve(ines, ready, ready.sha256, { headers: good }), await approve(ines, ready, ready.sha256, { headers: good })];
    expect([first.status, second.status]).toEqual([201, 201]);
    expect(second.bytes.equals(first.bytes)).toBe(true);
    expect((await chipOf(mira, ready.chipId)).approvals).toHaveLength(1);
    expectProblem(await approve(ines, ready, ready.sha256, { headers: key() }), 409, /stands already/);
  });
  test("refuses a key that is none", async () => {
    expectProblem(await call("POST", "/api/cases", { token: mira, json: CASE, headers: { "idempotency-key": "x".repeat(201) } }), 400, /1 to 200 characters/);
  });
});
