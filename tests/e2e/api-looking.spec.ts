import { expect } from "@playwright/test";
import { asAdmin } from "./support/database";
import { API, PAGES, type Things } from "./authorization-matrix";
import { emailOf, passwordOf } from "./support/accounts";
import { custodyOf, makeReady, type Ready } from "./support/bench";
import { call, expectProblem, sessionOf, tokenOf } from "./support/station";
import { test } from "./support/test";
import { loseImage } from "../support/tamper";

/** What changes by itself: when someone was last seen, and mail on its way. */
const OWN_LIFE = new Set(["sessions", "bench_tokens", "mails"]);

async function checksums(): Promise<Record<string, string>> {
  return asAdmin(async (db) => {
    const tables = (await db.query<{ name: string }[]>("SELECT TABLE_NAME AS name FROM information_schema.TABLES WHERE TABLE_SCHEMA = DATABASE()")).map(({ name }) => name);
    const found: Record<string, string> = {};
    for (const table of tables.filter((name) => !OWN_LIFE.has(name))) {
      const [row] = await db.query<{ Checksum: bigint | number | null }[]>(`CHECKSUM TABLE \`${table}\``);
      found[table] = String(row.Checksum);
    }
    return found;
  });
}

let chip: Ready;
let mira: string;
let ines: string;
test.beforeAll(async () => {
  [mira, ines] = await Promise.all([tokenOf("mira"), tokenOf("ines")]);
  chip = await makeReady(mira, { customer: "Only looked at", sizeBytes: 8192 });
});

test("looking changes nothing: every GET and every page leaves all tables as they were", async () => {
  const things: Things = { caseId: chip.caseId, driveId: chip.driveId, chipId: chip.chipId, readId: chip.reads[0].id, policy: {}, adminEmail: emailOf("odile"), unknown: chip.caseId };
  const [admin, lead] = [await sessionOf(emailOf("odile"), passwordOf("odile")), await sessionOf(emailOf("ines"), passwordOf("ines"))];
  const look = async () => {
    for (const cookie of [admin, lead]) {
      for (const row of API.filter((one) => one.method === "GET" && !one.route.startsWith("/api/auth"))) await call("GET", row.at?.(things) ?? row.route, { cookie });
      for (const row of PAGES) await call("GET", row.at?.(things) ?? row.route, { cookie });
    }
  };
  // comparisons that a first look computes are kept: nothing but a memory of what the bytes say
  await look();
  const before = await checksums();
  await look();
  expect(await checksums()).toEqual(before);
  expect(Object.keys(before)).toEqual(expect.arrayContaining(["custody_entries", "custody_heads", "reads", "approvals", "users", "policies", "idempotency_keys"]));
});

test("a stored image that is gone is refused in words wherever its bytes are looked at, and written down once", async () => {
  const bring = loseImage(chip.sha256);
  try {
    expectProblem(await call("GET", `/api/reads/${chip.reads[0].id}/bytes?offset=0&length=64`, { token: mira }), 409, /^The stored image/);
    expectProblem(await call("GET", `/api/reads/${chip.reads[1].id}/bytes?offset=0&length=64`, { token: mira }), 409, /^The stored image/);
    for (const path of [`/api/chips/${chip.chipId}`, `/api/chips/${chip.chipId}/view`, `/api/chips/${chip.chipId}/strips`]) expect((await call("GET", path, { token: mira })).status, path).toBe(200);
    const cookie = await sessionOf(emailOf("ines"), passwordOf("ines"));
    for (const path of [`/chips/${chip.chipId}`, `/chips/${chip.chipId}/decision`]) expect((await call("GET", path, { cookie })).status, path).toBe(200);
    expectProblem(await call("POST", `/api/reads/${chip.reads[0].id}/download`, { token: ines, json: { reason: "A look at the bytes." } }), 409, /is missing/);
    expect((await custodyOf(mira, chip.driveId)).filter((entry) => entry.action === "image.found-damaged")).toHaveLength(1);
  } finally {
    bring();
  }
});
