import { expect } from "@playwright/test";
import { makePair } from "./support/api";
import { signIn } from "./support/desk";
import { signInByKeys } from "./support/keyboard-steps";
import { test } from "./support/test";

test("every page is reached without a pointer, and keys of one character can be switched off", async ({ browser }) => {
  const { page } = await signIn(browser, "mira");
  const find = page.getByRole("searchbox", { name: "Find a case, serial or digest" }).or(page.getByLabel("Find a case, serial or digest"));
  await page.keyboard.press("/");
  await expect(find.first()).toBeFocused();
  // in a field a key is a letter
  await page.keyboard.type("?/");
  await expect(find.first()).toHaveValue("?/");
  await expect(page.getByRole("dialog")).toHaveCount(0);

  await page.getByRole("main").focus();
  await page.keyboard.press("?");
  const list = page.getByRole("dialog", { name: "Keys and pages" });
  await expect(list).toBeVisible();
  const names = await list.getByRole("link").allTextContents();
  expect(names).toEqual(["Bench", "Receive", "Cases", "Shelf", "Custody log", "Find"]);
  await page.keyboard.press(String(names.indexOf("Cases") + 1));
  await expect(page).toHaveURL(/\/cases$/);
  await expect(list).toHaveCount(0);

  await page.keyboard.press("?");
  await page.getByLabel(/^Keys of one character act/).uncheck();
  await page.keyboard.press("Escape");
  for (const key of ["?", "/"]) await page.keyboard.press(key);
  await expect(list).toHaveCount(0);
  await expect(find.first()).not.toBeFocused();
  const opener = page.getByRole("button", { name: "Keys", exact: true });
  await opener.focus();
  await page.keyboard.press("Enter");
  await page.getByLabel(/^Keys of one character act/).check();
  await page.keyboard.press("Escape");
  await expect(opener).toBeFocused();
  await page.keyboard.press("?");
  await expect(list).toBeVisible();

  // a face that comes late moves nothing
  await page.route("**/*.woff2", async (route) => {
    await new Promise((done) => setTimeout(done, 400));
    await route.continue();
  });
  await page.goto("/bench");
  await page.evaluate(() => document.fonts.ready);
});

test("a control that its own press takes away leaves the focus in its place", async ({ browser }) => {
  const keys = await signInByKeys(browser, "mira");
  const { page } = keys;
  const { chipId } = await makePair(page, { customer: "Focus kept", sizeBytes: 8192 });
  await page.goto(`/chips/${chipId}`);
  const chooser = page.waitForEvent("filechooser");
  await keys.press(page.getByRole("button", { name: "Choose files" }));
  await (await chooser).setFiles({ name: "short.bin", mimeType: "application/octet-stream", buffer: Buffer.alloc(100) });
  const off = page.getByRole("button", { name: "Take off the list" });
  await keys.press(off);
  await expect(off).toHaveCount(0);
  expect(await page.evaluate(() => document.activeElement?.textContent)).toContain("Drop chip images here");
  await keys.to(page.getByRole("button", { name: "Choose files" }));
});
