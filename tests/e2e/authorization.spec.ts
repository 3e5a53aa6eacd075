import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { expect } from "@playwright/test";
import { NIL } from "@/lib/core/words";
import { API, type ApiRow, PAGES, type Things, WHO, type Who } from "./authorization-matrix";
import { emailOf } from "./support/accounts";
import { makePair, randomImage, store, uploadForm } from "./support/bench";
import { changeAccount, makeNewcomerToken, type Newcomer } from "./support/newcomers";
import { type Answer, appUrl, call, done, expectProblem, sessionOf, tokenOf } from "./support/station";
import { test } from "./support/test";

const APP = path.resolve(import.meta.dirname, "../../app");
const UNKNOWN = "0badc0de-0000-4000-8000-00000badc0de";
const GARBAGE = "x".repeat(43);

/** The address that a file under app/ stands for: folders in parentheses don't show in it. */
const routeOf = (file: string) => `/${path.dirname(file).split(path.sep).filter((part) => part !== "." && !part.startsWith("(")).join("/")}`;
const filesCalled = (name: string) => readdirSync(APP, { recursive: true, encoding: "utf8" }).filter((file) => path.basename(file) === name);

/** The methods that a route file exports, in any of the forms in which TypeScript can write that. */
function methodsOf(file: string): string[] {
  const source = readFileSync(path.join(APP, file), "utf8");
  const declared = [...source.matchAll(/export\s+(?:const|let|async\s+function|function)\s+([A-Z]+)\b/g)].map((m) => m[1]);
  const listed = [...source.matchAll(/export\s*\{([^}]*)\}/g)].flatMap((m) => m[1].split(",").map((one) => one.trim().split(/\s+as\s+/).at(-1)!));
  return [...declared, ...listed].filter((name) => ["GET", "HEAD", "POST", "PUT", "PATCH", "DELETE", "OPTIONS"].includes(name));
}

test("every exported method of every route has exactly one row", () => {
  const there = filesCalled("route.ts").flatMap((file) => methodsOf(file).map((method) => `${method} ${routeOf(file)}`));
  expect(there.length).toBeGreaterThan(40);
  expect(API.map((row) => `${row.method} ${row.route}`).sort()).toEqual(there.sort());
});

test("no route file is without a method that the walk can see", () => {
  for (const file of filesCalled("route.ts")) expect(methodsOf(file), file).not.toEqual([]);
});

test("every page has exactly one row", () => {
  expect(PAGES.map((row) => row.route).sort()).toEqual(filesCalled("page.tsx").map(routeOf).sort());
});

let things: Things;
const tokens = new Map<Who, string>();
const cookies = new Map<Who, string>();
const people = new Map<Who, Newcomer>();

test.beforeAll(async () => {
  for (const who of ["technician", "lead", "auditor", "admin", "limited"] as const) {
    const newcomer = await makeNewcomerToken(who === "limited" ? "auditor" : who);
    tokens.set(who, newcomer.token);
    people.set(who, newcomer);
  }
  const gone = await makeNewcomerToken("admin");
  await changeAccount(gone.id, { disabled: true });
  tokens.set("disabled", gone.token).set("garbage", GARBAGE);
  cookies.set("disabled", gone.cookie).set("garbage", `next-auth.session-token=${GARBAGE}`);
  const mira = await tokenOf("mira");
  const pair = await makePair(mira, { customer: "Authorization matrix", sizeBytes: 4096 });
  const image = randomImage(4096);
  const { reads } = await store(mira, pair.chipId, "before", 1, [image, image]);
  things = {
    caseId: pair.caseId, driveId: pair.driveId, chipId: pair.chipId, readId: reads[0].id, unknown: UNKNOWN, adminEmail: emailOf("odile"),
    policy: await done<object>("GET", "/api/policy", { token: mira }),
  };
  await changeAccount(people.get("limited")!.id, { cases: [pair.caseId], endsOn: "2099-12-31" });
});

const REFUSALS = [401, 403, 404, 409, 422];
const bodyOf = (row: ApiRow) => (row.multipart ? { body: uploadForm({}, [{ bytes: randomImage(16) }]) } : row.body ? { json: row.body(things) } : {});

async function ask(row: ApiRow, who: Who): Promise<Answer> {
  const token = tokens.get(who);
  // who has no token comes as a page would, without a session
  return call(row.method, row.at?.(things) ?? row.route, { token, ...bodyOf(row), headers: token ? {} : { origin: appUrl() } });
}

test.describe("the interface", () => {
  for (const row of API) {
    test(`${row.method} ${row.route}`, async () => {
      for (const who of WHO) {
        const answer = await ask(row, who);
        expect.soft(answer.status, `${who}: ${answer.bytes.toString("utf8").slice(0, 200)}`).toBe(row.cells[who]);
        if (REFUSALS.includes(answer.status)) expectProblem(answer, answer.status, /\w.*\.$/);
      }
    });
  }
});

test.describe("pages", () => {
  // one of the rows above ends all sessions of whoever asks
  test.beforeAll(async () => {
    for (const [who, { email, password }] of people) cookies.set(who, await sessionOf(email, password));
  });
  for (const row of PAGES) {
    test(`${row.route}`, async () => {
      for (const who of WHO) {
        const where = row.at?.(things) ?? row.route;
        const answer = await call("GET", where, { cookie: cookies.get(who) });
        expect.soft(answer.status, who).toBe(row.cells[who]);
        if (row.cells.anonymous !== 307 || answer.status !== 307 || row.route === "/") continue;
        const signedIn = cookies.has(who) && who !== "disabled" && who !== "garbage";
        if (!signedIn) expect.soft(decodeURIComponent(new URL(answer.headers.get("location")!, appUrl()).searchParams.get("callbackUrl")!), who).toBe(where);
      }
    });
  }
});

test("every address refuses the methods that it does not take, and says which it takes", async () => {
  for (const file of filesCalled("route.ts").filter((name) => !name.includes("[..."))) {
    const taken = methodsOf(file);
    const at = routeOf(file).replace("[id]", UNKNOWN);
    for (const method of ["GET", "POST", "PUT", "PATCH", "DELETE"].filter((name) => !taken.includes(name))) {
      const answer = await call(method, at, { token: tokens.get("lead") });
      expectProblem(answer, 405, /^This address takes [A-Z, ]+ only\. Check the method\.$/);
      const allow = answer.headers.get("allow")!.split(", ").filter((name) => !["HEAD", "OPTIONS"].includes(name));
      expect(allow.sort(), `${method} ${at}`).toEqual([...taken].sort());
    }
  }
});

test("whoever holds nothing that counts changed nothing at all", async () => {
  expect(NIL).not.toBe(UNKNOWN);
  const entries = await done<{ entries: { actor: { name: string } }[] }>("GET", `/api/drives/${things.driveId}/custody`, { token: tokens.get("lead") });
  expect(entries.entries.map((entry) => entry.actor.name)).not.toContain("nobody");
});
