import { randomBytes } from "node:crypto";
import { expect } from "@playwright/test";
import { ageSessions, idleMinutes } from "./support/database";
import { changeAccount, makeAccount, makeNewcomer } from "./support/newcomers";
import { appUrl, call, done, expectProblem, fromPage, sessionOf, tokenOf, trySignIn } from "./support/station";
import { expectTrouble, test } from "./support/test";

/** A computer that no other test comes from: refused sign-ins are counted by address too. */
const newAddress = () => `2001:db8::${randomBytes(2).toString("hex")}:${randomBytes(2).toString("hex")}`;
const WRONG = "not the password at all";
const bench = (cookie: string, headers: Record<string, string> = {}) => call("GET", "/api/bench", { cookie, headers });

const signedOut = async (cookie: string) => {
  expectProblem(await bench(cookie), 401, /^Sign in first/);
  const page = await call("GET", "/bench", { cookie });
  expect([page.status, page.headers.get("location")]).toEqual([307, "/sign-in?callbackUrl=%2Fbench"]);
};

test.describe("signing in", () => {
  test("an unknown user, a wrong password and a disabled user get the very same answer", async () => {
    const [known, gone] = [await makeNewcomer("technician"), await makeNewcomer("technician")];
    await changeAccount(gone.id, { disabled: true });
    const answers = [
      await trySignIn(known.email, WRONG, { address: newAddress() }), await trySignIn("nobody@newcomers.example", WRONG, { address: newAddress() }),
      await trySignIn(gone.email, gone.password, { address: newAddress() }),
    ];
    for (const answer of answers) {
      expect(answer.status).toBe(401);
      expect(answer.cookie).toBe("");
      expect(answer.bytes.toString("utf8")).toBe(answers[0].bytes.toString("utf8"));
    }
    expect((await trySignIn(known.email, known.password, { address: newAddress() })).status).toBe(200);
  });

  test("an unknown user's answer takes as long as a wrong password's", async () => {
    const known = await makeNewcomer("technician");
    const times = async (email: string) => {
      const taken: number[] = [];
      for (let n = 0; n < 5; n += 1) {
        const from = performance.now();
        await trySignIn(email, WRONG, { address: newAddress() });
        taken.push(performance.now() - from);
      }
      return taken.sort((a, b) => a - b)[2];
    };
    const [wrong, unknown] = [await times(known.email), await times("nobody-at-all@newcomers.example")];
    // without the hash that is checked for nobody it would be a small part
    expect(unknown / wrong).toBeGreaterThan(0.4);
    expect(unknown / wrong).toBeLessThan(2.5);
  });

  test("many wrong passwords close one account for one address, and nobody else", async ({ browser }) => {
    const [target, colleague] = [await makeNewcomer("technician"), await makeNewcomer("lead")];
    const address = newAddress();
    let tries = 0;
    let last = await trySignIn(target.email, WRONG, { address });
    for (; !last.bytes.includes("error=limited") && tries < 30; tries += 1) last = await trySignIn(target.email, WRONG, { address });
    expect(tries).toBeGreaterThan(3);
    expect(tries).toBeLessThan(20);
    // also the right password has to wait now
    expect((await trySignIn(target.email, target.password, { address })).bytes.toString("utf8")).toContain("error=limited");
    expect((await trySignIn(target.email, target.password, { address: newAddress() })).status).toBe(200);
    expect((await trySignIn(colleague.email, colleague.password, { address })).status).toBe(200);

    const context = await browser.newContext({ extraHTTPHeaders: { "x-forwarded-for": address } });
    const page = await context.newPage();
    expectTrouble(/^401 POST \/api\/auth\/callback\/credentials$/);
    await page.goto("/sign-in");
    await page.getByLabel("E-mail address").fill(target.email);
    await page.getByLabel("Password").fill(target.password);
    await page.getByRole("button", { name: "Sign in" }).click();
    await expect(page.getByRole("alert").filter({ hasText: /too many|quarter of an hour|minutes/i })).toBeVisible();
    const workshop = await call("GET", "/custody/workshop", { cookie: await sessionOf(colleague.email, colleague.password) });
    expect(workshop.bytes.toString("utf8")).toContain("sign-in.limited");

    // the way out that the page names: a new password from the admin
    const { password } = await changeAccount(target.id, { newPassword: true });
    expect((await trySignIn(target.email, password!, { address })).status).toBe(200);
  });

  test("signing in leads to no other site, and its cookie is out of every script's reach", async () => {
    const person = await makeNewcomer("technician");
    const first = await call("GET", "/api/auth/csrf");
    const answer = await call("POST", "/api/auth/callback/credentials", {
      cookie: first.headers.getSetCookie().map((line) => line.split(";")[0]).join("; "), headers: { "content-type": "application/x-www-form-urlencoded" },
      body: new URLSearchParams({
        csrfToken: first.json<{ csrfToken: string }>().csrfToken, email: person.email, password: person.password, json: "true", callbackUrl: "https://elsewhere.example/",
      }).toString(),
    });
    expect(answer.status).toBe(200);
    expect(new URL(answer.json<{ url: string }>().url).origin).toBe(appUrl());
    expect(answer.headers.getSetCookie().find((line) => line.includes("session-token="))).toMatch(/; HttpOnly; SameSite=Lax$/);
  });
});

test.describe("a session", () => {
  test("ends with the sign-out, also for who kept the cookie", async () => {
    const { cookie } = await makeNewcomer("lead");
    await done("GET", "/api/bench", { cookie });
    const csrf = await call("GET", "/api/auth/csrf", { cookie });
    const out = await call("POST", "/api/auth/signout", {
      cookie: `${cookie}; ${csrf.headers.getSetCookie().map((line) => line.split(";")[0]).join("; ")}`, headers: { "content-type": "application/x-www-form-urlencoded" },
      body: new URLSearchParams({ csrfToken: csrf.json<{ csrfToken: string }>().csrfToken, json: "true" }).toString(),
    });
    expect(out.status).toBe(200);
    await signedOut(cookie);
  });

  test("is worth nothing when somebody tinkered with its cookie", async () => {
    const { cookie } = await makeNewcomer("lead");
    for (const other of [cookie.slice(0, -2), `${cookie.slice(0, -6)}AAAAAA`, "next-auth.session-token=", cookie.replace(/\..*$/, "")]) await signedOut(other);
    await done("GET", "/api/bench", { cookie });
  });

  test("has the new role at the next request, and ends with the account", async () => {
    const person = await makeNewcomer("technician");
    const mails = () => call("GET", "/api/mails", { cookie: person.cookie });
    expectProblem(await mails(), 403, /As technician/);
    await changeAccount(person.id, { role: "admin" });
    expect((await mails()).status).toBe(200);
    expect((await call("GET", "/users", { cookie: person.cookie })).status).toBe(200);
    await changeAccount(person.id, { role: "auditor" });
    expectProblem(await mails(), 403, /As auditor/);
    expect((await call("GET", "/users", { cookie: person.cookie })).status).toBe(404);
    await changeAccount(person.id, { disabled: true });
    await signedOut(person.cookie);
    // switched on again, the account needs a new sign-in
    await changeAccount(person.id, { disabled: false });
    await signedOut(person.cookie);
    await done("GET", "/api/bench", { cookie: await sessionOf(person.email, person.password) });
  });

  test("ends after 30 idle minutes, not before", async () => {
    const person = await makeNewcomer("technician");
    await ageSessions(person.id, { idleMinutes: 28 });
    await done("GET", "/api/bench", { cookie: person.cookie });
    expect(await idleMinutes(person.id)).toBe(0);
    await ageSessions(person.id, { idleMinutes: 31 });
    await signedOut(person.cookie);
    // nothing brings it back
    await ageSessions(person.id, { idleMinutes: -31 });
    await signedOut(person.cookie);
  });

  test("ends after 8 hours however busy it was", async () => {
    const person = await makeNewcomer("technician");
    await ageSessions(person.id, { ageMinutes: 8 * 60 - 2 });
    await done("GET", "/api/bench", { cookie: person.cookie });
    await ageSessions(person.id, { ageMinutes: 3 });
    await signedOut(person.cookie);
  });

  test("is not kept alive by refreshes that nobody asked for", async () => {
    const person = await makeNewcomer("technician");
    await ageSessions(person.id, { idleMinutes: 20 });
    expect((await bench(person.cookie, { "x-twinread-background": "1" })).status).toBe(200);
    expect((await call("GET", "/api/auth/session", { cookie: person.cookie })).status).toBe(200);
    expect(await idleMinutes(person.id)).toBe(20);
    await ageSessions(person.id, { idleMinutes: 11 });
    expectProblem(await bench(person.cookie, { "x-twinread-background": "1" }), 401, /^Sign in first/);
    await signedOut(person.cookie);
  });

  test("tells a script nothing about the person", async () => {
    const { cookie } = await makeNewcomer("technician");
    const session = await done<object>("GET", "/api/auth/session", { cookie });
    expect(Object.keys(session).sort()).toEqual(["expires", "sid"]);
  });
});

test.describe("a password", () => {
  test("that an admin made opens nothing but the choice of another", async () => {
    const account = await makeAccount("lead");
    const cookie = await sessionOf(account.email, account.password);
    expectProblem(await bench(cookie), 403, /^Choose a password of your own first/);
    expectProblem(await call("POST", "/api/account/tokens", { ...fromPage(cookie), json: { name: "Bench" } }), 403, /^Choose a password/);
    expect((await call("GET", "/bench", { cookie })).headers.get("location")).toBe("/account?choose=password");
    expect((await call("GET", "/account?choose=password", { cookie })).status).toBe(200);
    const choose = (current: string, next: string) => call("POST", "/api/account/password", { ...fromPage(cookie), json: { current, next } });
    expectProblem(await choose(WRONG, "a quiet bench by the window"), 422, /present password is different/);
    expectProblem(await choose(account.password, account.password), 422, /differs from the present one/);
    expectProblem(await choose(account.password, "short"), 422, /at least 15 characters/);
    expectProblem(await choose(account.password, "aaaaaaaaaaaaaaaaaaaa"), 422, /different characters/);
    expectProblem(await choose(account.password, `${account.email.split("@")[0]} and more`), 422, /your own name/);
    expectProblem(await bench(cookie), 403, /^Choose a password/);
    expect((await choose(account.password, "a quiet bench by the window")).status).toBe(200);
    await done("GET", "/api/bench", { cookie });
    expect((await trySignIn(account.email, account.password, { address: newAddress() })).status).toBe(401);
  });

  test("that is new ends the sign-ins elsewhere, and a reset ends them all", async () => {
    const person = await makeNewcomer("technician");
    const elsewhere = await sessionOf(person.email, person.password);
    const next = "another long evening at the bench";
    await done("POST", "/api/account/password", { ...fromPage(person.cookie), json: { current: person.password, next } }, 200);
    await signedOut(elsewhere);
    await done("GET", "/api/bench", { cookie: person.cookie });
    const { password } = await changeAccount(person.id, { newPassword: true });
    await signedOut(person.cookie);
    expect((await trySignIn(person.email, next, { address: newAddress() })).status).toBe(401);
    expectProblem(await bench(await sessionOf(person.email, password!)), 403, /^Choose a password/);
  });

  test("shows in no list of accounts, nor does its hash", async () => {
    const account = await makeAccount("lead");
    const users = (await call("GET", "/api/users", { token: await tokenOf("odile") })).bytes.toString("utf8");
    expect(users).toContain(account.email);
    expect(users).not.toContain(account.password);
    expect(users).not.toMatch(/argon2|hash/i);
  });
});
