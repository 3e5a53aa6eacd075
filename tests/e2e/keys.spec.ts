import { expect } from "@playwright/test";
import { signIn } from "./support/desk";
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
});
