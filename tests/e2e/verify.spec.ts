import { createHash } from "node:crypto";
import { truncateSync, writeFileSync } from "node:fs";
import path from "node:path";
import { expect, type Page } from "@playwright/test";
import type { CaseRow, ListView } from "@/lib/views";
import { makeBag, sealKeyA, testKey } from "../support/make-bag";
import { zipBag } from "../support/zip-bag";
import { expectAccessible } from "./support/axe";
import { newFolder } from "./support/files";
import { makeNewcomer } from "./support/newcomers";
import { call, fromPage } from "./support/station";
import { test } from "./support/test";

const folder = newFolder();
async function bundle(name: string, bag = makeBag({ drives: 2 })): Promise<string> {
  const file = path.join(folder, name);
  writeFileSync(file, await zipBag(bag));
  return file;
}

/** The page with its check loaded; from then on it has no network, and whatever it asks for is written down. */
async function cutOff(page: Page): Promise<string[]> {
  await page.goto("/verify");
  await expect(page.locator("[data-ready]")).toBeVisible();
  await page.waitForLoadState("networkidle");
  const asked: string[] = [];
  page.on("request", (request) => asked.push(`${request.method()} ${request.url()}`));
  await page.context().setOffline(true);
  return asked;
}

const choose = (page: Page, file: string) => page.getByLabel("Case bundle or chip image").setInputFiles(file);
const step = (page: Page, key: string) => page.locator(`[data-step="${key}"]`);

test("checks a good bundle without account and without network, and asks for nothing", async ({ page }) => {
  const asked = await cutOff(page);
  await choose(page, await bundle("good.zip"));
  await expect(page.getByText("All in order: 2 custody logs, 12 entries, 25 files.")).toBeVisible();
  for (const key of ["archive", "bagit", "oxum", "manifest", "tag-manifest", "tag-signature", "keys", "drive-1", "drive-2", "record", "seal", "proof"]) {
    await expect(step(page, key)).toHaveAttribute("data-state", "in-order");
  }
  await expect(step(page, "fingerprint")).toHaveAttribute("data-state", "not-checked");
  await expect(step(page, "fingerprint")).toContainText("Keys not compared");
  await page.getByLabel("Key fingerprint").fill(sealKeyA.id.toUpperCase().replace(/(.{8})/g, "$1 "));
  await page.getByRole("button", { name: "Check again with this fingerprint" }).click();
  await expect(step(page, "fingerprint")).toContainText("The seal key has the fingerprint that you gave.");
  expect(asked).toEqual([]);
  await expectAccessible(page, "the check of a good bundle");
});

test("names the file that was changed, and what was expected and found", async ({ page }) => {
  await cutOff(page);
  const bag = makeBag();
  const name = "data/drives/1/original-U12/before-1.bin";
  await choose(page, await bundle("changed.zip", new Map(bag).set(name, Buffer.alloc(64, 1))));
  await expect(page.getByText(`Not in order. ${name}:`)).toBeVisible();
  await expect(step(page, "manifest")).toContainText(createHash("sha256").update(bag.get(name)!).digest("hex"));
  await expect(step(page, "drive-1")).toHaveAttribute("data-state", "not-in-order");
});

test("tells a stranger's bundle by the fingerprint, and says when half a fingerprint was pasted", async ({ page }) => {
  await cutOff(page);
  await page.getByLabel("Key fingerprint").fill("abc");
  await expect(page.getByText("A key fingerprint has 64 hex digits.")).toBeVisible();
  await page.getByLabel("Key fingerprint").fill(testKey("the workshop's own").id);
  await choose(page, await bundle("stranger.zip"));
  await expect(page.getByText("somebody else may have made this bundle").first()).toBeVisible();
});

test("gives the check numbers of a single file and compares them", async ({ page }) => {
  const asked = await cutOff(page);
  const image = path.join(folder, "U12-read.bin");
  writeFileSync(image, Buffer.alloc(4096, 0x5a));
  const sha256 = createHash("sha256").update(Buffer.alloc(4096, 0x5a)).digest("hex");
  await choose(page, image);
  await expect(page.getByText("4 KiB, 4,096 bytes")).toBeVisible();
  await page.getByLabel("SHA-256 to compare with").fill(sha256.toUpperCase());
  await expect(page.getByText("in every byte")).toBeVisible();
  await page.getByLabel("SHA-256 to compare with").fill("0".repeat(64));
  await expect(page.getByText("They differ.")).toBeVisible();
  expect(asked).toEqual([]);
});

test("says what is no bundle, and stops when it is told to", async ({ page }) => {
  await page.goto("/verify");
  await expect(page.locator("[data-ready]")).toBeVisible();
  const text = path.join(folder, "letter.zip");
  writeFileSync(text, "Dear all");
  await choose(page, text);
  await expect(page.getByText("it is no ZIP archive").first()).toBeVisible();
  await page.getByRole("button", { name: "Check another file" }).click();
  const large = path.join(folder, "large.bin");
  writeFileSync(large, "");
  truncateSync(large, 1024 * 1024 * 1024);
  await choose(page, large);
  await page.getByRole("button", { name: "Stop checking" }).click();
  await expect(page.getByText("Stopped. Nothing was found out about this file.")).toBeVisible();
  await choose(page, await bundle("after.zip"));
  await expect(page.getByText("All in order: 2 custody logs")).toBeVisible();
});

test("takes the bundle that this very workshop sends", async ({ page }) => {
  const { cookie } = await makeNewcomer("lead");
  const list = JSON.parse((await call("GET", "/api/cases", { cookie })).bytes.toString("utf8")) as ListView<CaseRow>;
  const made = await call("POST", `/api/cases/${list.items.find((row) => row.chips.length > 0)!.id}/bundle`, fromPage(cookie));
  expect(made.status).toBe(200);
  const file = path.join(folder, "real.zip");
  writeFileSync(file, made.bytes);
  await cutOff(page);
  await choose(page, file);
  await expect(page.getByText(/^All in order: /)).toBeVisible();
  for (const key of ["seal", "proof"]) await expect(step(page, key)).toHaveAttribute("data-state", "in-order");
});

test("is linked from where somebody without an account comes in", async ({ page }) => {
  await page.goto("/sign-in");
  await page.getByRole("link", { name: "checked here" }).click();
  await expect(page.getByRole("heading", { name: "Check a case bundle" })).toBeVisible();
});
