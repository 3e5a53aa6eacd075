import { expect } from "@playwright/test";
import { readFileSync } from "node:fs";
import { makePair, randomImage, store } from "./support/bench";
import { signIn } from "./support/desk";
import { call, tokenOf } from "./support/station";
import { expectTrouble, test } from "./support/test";

test("an auditor sees at once whether anything is wrong, has every log checked, and can stop it", async ({ browser }) => {
  test.setTimeout(180_000);
  const { page } = await signIn(browser, "rhys");
  await page.getByRole("link", { name: "Audit", exact: true }).click();
  await expect(page.getByRole("heading", { level: 1, name: "Audit" })).toBeVisible();
  await expect(page.getByRole("row").filter({ hasText: "Clock" })).toContainText("clocks of app and database agree");

  await page.getByRole("navigation", { name: "Audit" }).getByRole("link", { name: "Logs" }).click();
  await page.getByRole("button", { name: /^Check all \d+ now$/ }).click();
  await expect(page.getByRole("status").filter({ hasText: /Checked all \d+\./ })).toBeVisible({ timeout: 60_000 });
  await expect(page.getByRole("cell", { name: /^Clean/ }).first()).toBeVisible();
  await page.goto("/audit");
  await expect(page.getByRole("row").filter({ hasText: "Logs" })).toContainText(/check(s)? out\./);

  // one that is slow to answer: the checking stops where it is told to
  await page.goto("/audit/drives");
  await page.route("**/api/audit/checks/*", async (route) => {
    await new Promise((done) => setTimeout(done, 700));
    await route.continue();
  });
  await page.getByRole("button", { name: /^Check all/ }).click();
  await page.getByRole("button", { name: "Stop the checking" }).click();
  await expect(page.getByRole("status").filter({ hasText: /Stopped after [01] of \d+\./ })).toBeVisible();
});

/** A drive of the test's own, an image of which was handed out: its log holds steps of more than one group. */
async function handedOut(): Promise<string> {
  const pair = await makePair(await tokenOf("mira"), { customer: "Audited", sizeBytes: 4096 });
  const [read] = (await store(await tokenOf("mira"), pair.chipId, "before", 1, [randomImage(4096)])).reads;
  expect((await call("POST", `/api/reads/${read.id}/download`, { token: await tokenOf("ines"), json: { reason: "A look on another bench." } })).status).toBe(200);
  return pair.driveId;
}

test("a list keeps its filter in the address, and its file holds what is shown", async ({ browser }) => {
  await handedOut();
  const { page } = await signIn(browser, "rhys");
  await page.goto("/audit/hand-outs");
  const all = await page.getByRole("table").getByRole("row").count();
  expect(all).toBeGreaterThan(1);
  await page.getByLabel("Step").selectOption({ label: "Image handed out" });
  await page.getByRole("button", { name: "Show", exact: true }).click();
  await expect(page).toHaveURL(/what=image\.handed-out/);
  const shown = (await page.getByRole("table").getByRole("row").count()) - 1;
  const [download] = await Promise.all([page.waitForEvent("download"), page.getByRole("link", { name: "Save as CSV" }).click()]);
  expect(download.suggestedFilename()).toBe("twinread-hand-outs.csv");
  const lines = readFileSync(await download.path(), "utf8").split("\r\n");
  expect(lines[0]).toMatch(/^time,who,role,action,what,thing,sha-256,to,reason,case,drive,log,entry,/);
  expect(lines.at(-1)).toBe("");
  expect(lines.slice(1, -1).length).toBeGreaterThanOrEqual(shown);
  expect(lines.slice(1, -1).every((line) => line.includes("image.handed-out"))).toBe(true);
  // a link leads to the entry in its log
  await page.getByRole("table").getByRole("link", { name: /entry \d+$/ }).first().click();
  await expect(page).toHaveURL(/custody#entry-\d+$/);
});

test("a drive's log shows one group of steps, counts them, and keeps that in the address", async ({ browser }) => {
  const { page } = await signIn(browser, "mira");
  await page.goto(`/drives/${await handedOut()}/custody`);
  const rows = page.getByRole("table", { name: /Entries of the custody log/ }).locator("tbody tr");
  await expect(rows.first()).toBeVisible();
  const all = await rows.count();
  await page.getByLabel("Steps").selectOption({ label: (await page.getByLabel("Steps").locator("option").filter({ hasText: "Drive, boards and chips" }).textContent())! });
  await expect(page).toHaveURL(/group=records/);
  await expect(page.getByRole("status").filter({ hasText: /of \d+ entr/ })).toBeVisible();
  const some = await rows.count();
  expect(some).toBeLessThan(all);
  await page.reload();
  await expect(rows).toHaveCount(some);
  await page.getByRole("button", { name: "Show the whole log" }).click();
  await expect(rows).toHaveCount(all);
  await expect(page).not.toHaveURL(/group=/);
});

test("an admin changes the seal's key only with a reason, and reads what it means", async ({ browser }) => {
  const { page } = await signIn(browser, "odile");
  await page.goto("/audit/seals");
  await page.getByRole("button", { name: "Make a seal now" }).click();
  await expect(page.getByText(/Seal \d+ is made/).first()).toBeVisible();
  const before = await page.locator("dd code").first().textContent();
  await page.getByRole("button", { name: /^Change the key….*seals/ }).click();
  const dialog = page.getByRole("dialog");
  await expect(dialog).toContainText("tell the auditors why");
  await dialog.getByRole("button", { name: "Change the key" }).click();
  await expect(dialog.getByRole("alert")).toBeVisible();
  await dialog.getByLabel("Reason").fill("The disk of the server was replaced.");
  await dialog.getByRole("button", { name: "Change the key" }).click();
  await expect(dialog).toBeHidden();
  await expect(page.locator("dd code").first()).not.toHaveText(before!);
  await expect(page.getByText("The disk of the server was replaced.").first()).toBeVisible();
  await page.getByRole("button", { name: "Make a seal now" }).click();
  await expect(page.getByRole("table", { name: "Seals" }).getByRole("row").nth(1)).toContainText("signed, links to");
});

test("a technician finds no audit page", async ({ browser }) => {
  const { page } = await signIn(browser, "mira");
  await expect(page.getByRole("link", { name: "Audit", exact: true })).toHaveCount(0);
  expectTrouble(/^404 GET \/audit$/);
  expect((await page.goto("/audit"))?.status()).toBe(404);
});
