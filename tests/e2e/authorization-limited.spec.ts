import { expect } from "@playwright/test";
import { AUDIT_LISTS, WORKSHOP_LISTS } from "@/lib/core/audit";
import { API, type ApiRow, PAGES } from "./authorization-matrix";
import { randomImage, uploadForm } from "./support/bench";
import { asAdmin } from "./support/database";
import { openDesk } from "./support/desk";
import { changeAccount, type Newcomer } from "./support/newcomers";
import { type Answer, call, done, expectProblem, fromPage, sessionOf, trySignIn } from "./support/station";
import { expectTrouble, test } from "./support/test";
import { addressIn, type CaseParts, makeLimitedAuditor, makeParts, neverParts, nounOf } from "./support/two-cases";

/** An auditor with a case list, over every route and page: what they get of a case on it, and of another. */
let own: CaseParts;
let other: CaseParts;
let never: CaseParts;
let limited: Newcomer & { cookie: string; token: string };

test.beforeAll(async () => {
  own = await makeParts("Case on the list");
  other = await makeParts("Case outside the list");
  never = neverParts(other);
  limited = await makeLimitedAuditor([own.caseId]);
});

const bodyOf = (row: ApiRow, parts: CaseParts) => (row.multipart ? { body: uploadForm({}, [{ bytes: randomImage(16) }]) } : row.body ? { json: row.body(parts) } : {});
const ask = (row: ApiRow, parts: CaseParts): Promise<Answer> => call(row.method, addressIn(row, parts), { token: limited.token, ...bodyOf(row, parts) });

/** What the body of an answer holds of the other case. */
function tellsOf(text: string): string[] {
  return [other.ref, ...Object.values(other.ids).filter((id) => id !== other.unknown), other.sha256, "Case outside the list"].filter((part) => text.includes(part));
}

/** what is about no case: one's own tokens, and what belongs to the workshop as a whole */
const NO_CASE = ["tokens", "mails", "users"];
const ABOUT = API.filter((row) => row.route.includes("/[id]") && !NO_CASE.some((noun) => row.route.includes(`/${noun}/[id]`)));
/** where the matrix tries what does not exist, and an auditor may: of a case on the list it is done */
const DONE: Record<string, number> = { "POST /api/cases/[id]/bundle": 200, "POST /api/audit/checks/[id]/assessment": 201, "POST /api/audit/checks/[id]": 200, "GET /api/boards/[id]/photos": 200 };

test("every address with an id in it is about a part of a case that the walk knows", () => {
  expect(ABOUT.length).toBeGreaterThan(25);
  for (const row of ABOUT) expect(nounOf(row.route, own), row.route).not.toBeNull();
});

test.describe("of a case on the list and of another", () => {
  for (const row of ABOUT) {
    test(`${row.method} ${row.route}`, async () => {
      const [mine, theirs, nobodys] = [await ask(row, own), await ask(row, other), await ask(row, never)];
      const done = DONE[`${row.method} ${row.route}`] ?? row.cells.limited;
      // a read that isn't a composite has no votes, a case on the list or not
      expect.soft(mine.status, mine.bytes.toString("utf8").slice(0, 200)).toBe(done);
      expect.soft([403, 404]).toContain(theirs.status);
      if (row.method === "GET" || done < 300) expect.soft(theirs.status).toBe(404);
      expectProblem(theirs, theirs.status, /\w.*\.$/);
      // word for word what never was, but for the time in the headers
      expect.soft(theirs.bytes.toString("utf8")).toBe(nobodys.bytes.toString("utf8"));
      expect.soft(theirs.status).toBe(nobodys.status);
    });
  }
});

test.describe("lists", () => {
  for (const row of API.filter((one) => one.method === "GET" && !one.route.includes("["))) {
    test(`GET ${row.route} tells nothing of another case`, async () => {
      const answer = await ask(row, other);
      expect(answer.status).toBe(row.cells.limited);
      expect(tellsOf(answer.bytes.toString("utf8"))).toEqual([]);
    });
  }

  for (const list of AUDIT_LISTS) {
    test(`the audit list of ${list} tells nothing of another case, as JSON and as CSV`, async () => {
      for (const format of ["json", "csv"]) {
        const answer = await call("GET", `/api/audit/${list}?${new URLSearchParams({ format, ...(format === "json" ? { pageSize: "200" } : {}) })}`, { token: limited.token });
        expect(answer.status).toBe(WORKSHOP_LISTS.includes(list) ? 404 : 200);
        expect(tellsOf(answer.bytes.toString("utf8"))).toEqual([]);
      }
    });
  }

  test("searches and finds are within the list", async () => {
    const get = async <T>(path: string) => (await call("GET", path, { token: limited.token })).json<T>();
    expect(await get(`/api/cases?q=${other.ref}`)).toMatchObject({ total: 0, items: [] });
    expect(await get("/api/cases?q=list")).toMatchObject({ total: 1, items: [{ id: own.caseId }] });
    expect(await get(`/api/find?digest=${other.sha256}`)).toEqual({ hits: [] });
    expect((await get<{ hits: unknown[] }>(`/api/find?digest=${own.sha256}`)).hits).toHaveLength(3);
    const dropped = async (bytes: Uint8Array<ArrayBuffer>) => (await call("POST", "/api/find", { token: limited.token, body: uploadForm({}, [{ bytes }]) })).json<{ hits: unknown[] }>().hits;
    expect(await dropped(other.image)).toEqual([]);
    expect(await dropped(own.image)).toHaveLength(3);
  });
});

test.describe("pages", () => {
  let cookie: string;
  test.beforeAll(async () => { cookie = await sessionOf(limited.email, limited.password); });
  for (const row of PAGES.filter((one) => one.cells.limited !== 307 && !one.route.includes("[token]"))) {
    test(`${row.route}`, async () => {
      const [mine, theirs] = [await call("GET", addressIn(row, own), { cookie }), await call("GET", addressIn(row, other), { cookie })];
      expect(mine.status).toBe(row.cells.limited);
      expect(theirs.status).toBe(row.route.includes("[id]") ? 404 : row.cells.limited);
      // the address itself comes back in the page
      const html = theirs.bytes.toString("utf8").replaceAll(addressIn(row, other), "");
      expect(tellsOf(html).filter((part) => !addressIn(row, other).includes(part))).toEqual([]);
    });
  }

  test("the search field finds nothing of another case", async () => {
    for (const q of [other.sha256, "Case outside the list", other.ref]) {
      const { status, bytes } = await call("GET", `/find?${new URLSearchParams({ q })}`, { cookie });
      expect(status).toBe(200);
      expect(tellsOf(bytes.toString("utf8")).filter((part) => part !== q), q).toEqual([]);
    }
  });
});

test("what the admin takes off the list is gone at the next request, by token and by session", async () => {
  const someone = await makeLimitedAuditor([own.caseId, other.caseId]);
  const cookie = await sessionOf(someone.email, someone.password);
  const states = async () => [(await call("GET", `/api/cases/${other.caseId}`, { token: someone.token })).status, (await call("GET", `/api/cases/${other.caseId}`, { cookie })).status, (await call("GET", `/cases/${other.caseId}`, { cookie })).status];
  expect(await states()).toEqual([200, 200, 200]);
  await changeAccount(someone.id, { cases: [own.caseId] });
  expect(await states()).toEqual([404, 404, 404]);
  await changeAccount(someone.id, { cases: null });
  expect(await states()).toEqual([200, 200, 200]);
});

test("past the last day sign-in says so, and sessions and tokens end at once", async ({ browser }) => {
  const someone = await makeLimitedAuditor([own.caseId]);
  const cookie = await sessionOf(someone.email, someone.password);
  expect((await call("GET", "/api/bench", { cookie })).status).toBe(200);
  await asAdmin((db) => db.query("UPDATE users SET ends_at = '2026-02-01 00:00:00' WHERE id = ?", [someone.id]));
  expectProblem(await call("GET", "/api/bench", { token: someone.token }), 401, /^The account of this bench token ended on 31 January 2026\. Ask the admin\.$/);
  expect((await call("GET", "/api/bench", { cookie })).status).toBe(401);
  expect((await call("GET", "/bench", { cookie })).status).toBe(307);
  expect((await call("POST", "/api/account/tokens", { ...fromPage(cookie), json: { name: "x" } })).status).toBe(401);
  expect((await trySignIn(someone.email, someone.password)).cookie).toBe("");
  expectTrouble(/^401 POST \/api\/auth\/callback\/credentials$/);
  const { page } = await openDesk(browser);
  await page.goto("/sign-in");
  await page.getByLabel("E-mail address").fill(someone.email);
  await page.getByLabel("Password").fill(someone.password);
  await page.getByRole("button", { name: "Sign in" }).click();
  await expect(page.locator("form").getByRole("alert")).toContainText("This account ended on 31 January 2026.");
  await expect(page.locator("form").getByRole("alert")).toContainText("ask the admin");
  await page.getByLabel("Password").fill("not the password");
  await page.getByRole("button", { name: "Sign in" }).click();
  await expect(page.locator("form").getByRole("alert")).toContainText("That didn’t match.");
  await changeAccount(someone.id, { endsOn: "2099-12-31" });
  expect((await done<{ items: unknown[] }>("GET", "/api/bench", { token: someone.token }, 200)).items.length).toBeGreaterThan(0);
});
