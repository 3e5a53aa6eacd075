import { expect, type Page } from "@playwright/test";
import { makeReady, type Ready } from "./support/bench";
import { type Desk, signIn } from "./support/desk";
import { tokenOf } from "./support/station";
import { test } from "./support/test";

let ready: Ready;
let desk: Desk;

test.beforeAll(async ({ browser }) => {
  ready = await makeReady(await tokenOf("mira"), { customer: "Lindmoor Veterinary Practice" });
  desk = await signIn(browser, "mira");
});
test.afterAll(() => desk.context.close());

/** Holds every request that fits until the test lets go. */
async function hold(page: Page, fits: RegExp): Promise<() => void> {
  let letGo = (): void => undefined;
  const held = new Promise<void>((done) => { letGo = done; });
  await page.route(fits, async (route) => {
    await held;
    // whoever asked may have given up by now
    await route.continue().catch(() => undefined);
  });
  return letGo;
}

test("a check whose answer does not come says what it does and how long, and can be stopped", async () => {
  const { page } = desk;
  await page.goto(`/drives/${ready.driveId}/custody`);
  const letGo = await hold(page, /\/custody\/check$/);
  await page.getByRole("button", { name: "Check the log" }).click();
  await expect(page.getByRole("status").filter({ hasText: "is worked out again" })).toHaveText(/^Every hash and signature of \d+ entries is worked out again\.\s*$/);
  await expect(page.getByText(/[1-9]\d* s so far\./)).toBeVisible();
  await page.getByRole("button", { name: "Stop", exact: true }).click();
  await expect(page.getByRole("alert").filter({ hasText: "The log was not checked." })).toContainText("You stopped it before the answer came.");
  await expect(page.getByRole("button", { name: "Check the log" })).toBeFocused();
  letGo();
  await page.unrouteAll({ behavior: "wait" });
});

test("a page that does not come says so, and one can stay", async () => {
  const { page } = desk;
  await page.goto("/custody");
  const letGo = await hold(page, /\/shelf\?_rsc=/);
  await page.getByRole("navigation", { name: "Main" }).getByRole("link", { name: "Shelf" }).click();
  await expect(page.getByText("“Shelf” is being opened.")).toBeVisible();
  await page.getByRole("button", { name: "Stay here" }).click();
  await expect(page.getByText("“Shelf” is being opened.")).toHaveCount(0);
  letGo();
  await page.unrouteAll({ behavior: "wait" });
  await page.waitForLoadState("networkidle");
  await expect(page).toHaveURL(/\/custody$/);
  await expect(page.getByRole("heading", { level: 1, name: "Custody log" })).toBeVisible();
});

test("nothing moves by itself, asked for or not", async () => {
  const { page } = desk;
  await page.goto(`/chips/${ready.chipId}`);
  await page.keyboard.press("?");
  await expect(page.getByRole("dialog")).toBeVisible();
  expect(await page.evaluate(() => document.getAnimations().length)).toBe(0);
  const moving = await page.evaluate(() => [...document.styleSheets].flatMap((sheet) => [...sheet.cssRules]).map((rule) => rule.cssText)
    .flatMap((text) => text.match(/@keyframes [^{]*|(?<![\w-])(transition|animation|scroll-behavior)(-[a-z]+)?: [^;]*/g) ?? []));
  expect(moving).toEqual([]);
});

test("where the system chooses the colours, plates, vias, what is chosen and the lead button are still told apart", async () => {
  const { page } = desk;
  await page.emulateMedia({ forcedColors: "active" });
  const ground = (selector: string) => page.locator(selector).first().evaluate((part) => getComputedStyle(part).backgroundColor);
  await page.goto(`/drives/${ready.driveId}/custody`);
  const paper = await page.evaluate(() => getComputedStyle(document.body).backgroundColor);
  expect(await ground(".via-legend .via-signed i")).not.toBe(await ground(".via-legend .via-entry i"));
  expect(await ground('.seg [aria-pressed="true"]')).not.toBe(await ground('.seg [aria-pressed="false"]'));
  expect(await ground(".btn-lead")).not.toBe(paper);
  await page.goto(`/chips/${ready.chipId}`);
  expect(await ground(".ruled .plate-original")).not.toBe(await ground(".ruled .plate-donor"));
  expect(await page.locator(".ruled .plate-donor").first().evaluate((part) => getComputedStyle(part).boxShadow)).not.toBe("none");
  await page.emulateMedia({ forcedColors: null });
});
