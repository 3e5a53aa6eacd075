import { expect } from "@playwright/test";
import { makeNewcomer } from "./support/newcomers";
import { call } from "./support/station";
import { test } from "./support/test";

const bench = (cookie: string) => call("GET", "/api/bench", { cookie });
const nonceOf = (policy: string | null) => /script-src 'nonce-([^']+)' 'strict-dynamic'(;|$)/.exec(policy ?? "")?.[1];

test("every page carries a nonce that differs each time and stands on every script", async () => {
  const pages = [await call("GET", "/sign-in"), await call("GET", "/sign-in"), await call("GET", `/summary/${"x".repeat(43)}`)];
  const nonces = pages.map((page) => nonceOf(page.headers.get("content-security-policy")));
  expect(new Set(nonces).size).toBe(3);
  for (const [index, page] of pages.entries()) {
    const scripts = page.bytes.toString("utf8").match(/<script\b[^>]*>/g) ?? [];
    expect(scripts.length).toBeGreaterThan(0);
    for (const script of scripts) expect(script).toContain(`nonce="${nonces[index]}"`);
    const policy = page.headers.get("content-security-policy")!;
    for (const rule of ["default-src 'self'", "object-src 'none'", "base-uri 'none'", "form-action 'self'", "frame-ancestors 'none'"]) expect(policy).toContain(rule);
    expect(policy).not.toMatch(/unsafe-eval|script-src[^;]*unsafe-inline/);
  }
});

test("every page carries a policy of our own, whatever came in", async () => {
  const planted = "cGxhbnRlZC1ub25jZS0xMjM0";
  const page = await call("GET", "/sign-in", { headers: {
    "content-security-policy": `script-src 'nonce-${planted}'`, "x-nonce": planted, "content-security-policy-report-only": `script-src 'nonce-${planted}'`,
  } });
  expect(page.bytes.includes(planted)).toBe(false);
  expect(nonceOf(page.headers.get("content-security-policy"))).not.toBe(planted);
  // the path that a page comes back to is ours too
  const away = await call("GET", "/bench", { headers: { "x-twinread-path": "//elsewhere.example/" } });
  expect(away.headers.get("location")).toBe("/sign-in?callbackUrl=%2Fbench");
});

test("every answer carries headers that keep it out of caches, frames and guesses", async () => {
  const { cookie } = await makeNewcomer("technician");
  for (const answer of [await call("GET", "/bench", { cookie }), await bench(cookie), await call("GET", "/api/health"), await call("GET", "/api/bench"), await call("GET", "/api/drivers")]) {
    expect(answer.headers.get("x-content-type-options")).toBe("nosniff");
    expect(answer.headers.get("x-frame-options")).toBe("DENY");
    expect(answer.headers.get("referrer-policy")).toBe("no-referrer");
    expect(answer.headers.get("cache-control")).toContain("no-store");
    expect(answer.headers.get("x-powered-by")).toBeNull();
  }
  expect((await bench(cookie)).headers.get("content-security-policy")).toBe("default-src 'none'; frame-ancestors 'none'; sandbox");
});

test("the mark that a browser asks for by itself is there", async () => {
  const [own, usual] = [await call("GET", "/icon.svg"), await call("GET", "/favicon.ico")];
  expect([own.status, usual.status]).toEqual([200, 200]);
  expect(usual.bytes.equals(own.bytes)).toBe(true);
  expect(usual.headers.get("content-type")).toContain("image/svg+xml");
});
