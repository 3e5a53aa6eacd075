import { readFileSync } from "node:fs";
import { expect, type Page } from "@playwright/test";
import { signIn } from "./support/desk";
import { done, tokenOf } from "./support/station";
import { test } from "./support/test";

const fresh = () => `BX ${Date.now().toString(36)}-${Math.floor(Math.random() * 1000)}`;

async function newDrive(boardNumber: string) {
  const token = await tokenOf("mira");
  const made = await done<{ id: string; ref: string }>("POST", "/api/cases", { token, json: { customer: { name: "Shelf tests", email: "shelf@apitests.example" }, damage: "Water" } });
  const drive = await done<{ id: string }>("POST", `/api/cases/${made.id}/drives`, { token, json: { partNumber: "PN 1" } });
  const board = await done<{ id: string }>("POST", `/api/drives/${drive.id}/boards`, { token, json: { role: "original", boardNumber, revision: "rev C" } });
  await done("POST", `/api/boards/${board.id}/chips`, { token, json: { designator: "U12", bus: "spi", sizeBytes: 8192, supplyMillivolts: 3300 } });
  return { ref: made.ref, driveId: drive.id };
}

async function bring(page: Page, text: string) {
  await page.goto("/shelf/import");
  await page.getByLabel("Rows that I paste").check();
  await page.getByLabel("Rows, with the header row first").fill(text);
  await page.getByRole("button", { name: "Try it" }).click();
}

test("a technician puts a board on the shelf, and a drive that it fits takes it with its chip", async ({ browser }) => {
  test.setTimeout(180_000);
  const boardNumber = fresh();
  const { driveId, ref } = await newDrive(boardNumber);
  const { page } = await signIn(browser, "mira");
  await page.getByRole("link", { name: "Shelf", exact: true }).click();
  await page.getByRole("button", { name: "Put a board on the shelf…" }).click();
  const dialog = page.getByRole("dialog");
  await dialog.getByRole("button", { name: "Put it on the shelf" }).click();
  await expect(dialog.getByRole("alert").first()).toContainText("Give the board number");
  await dialog.getByLabel("Board number").fill(boardNumber.toLowerCase());
  await dialog.getByLabel("Revision").fill("rev D");
  await dialog.getByLabel("Place").fill("Cabinet 9");
  await dialog.getByRole("button", { name: "Add a chip" }).click();
  await dialog.getByLabel("Designator").fill("u12");
  await dialog.getByLabel("Bus").selectOption("spi");
  await dialog.getByLabel("Size").fill("8 KiB");
  await dialog.getByRole("button", { name: "Put it on the shelf" }).click();
  await expect(page.getByRole("heading", { level: 1 })).toContainText(/D-\d{4}/);
  const number = /D-\d+/.exec((await page.getByRole("heading", { level: 1 }).textContent())!)![0];
  await page.getByRole("button", { name: "Reserve it for a case…" }).click();
  await page.getByLabel("Case number").fill(ref);
  await page.getByRole("button", { name: "Reserve it" }).last().click();
  await expect(page.getByText(`Reserved for case ${ref}.`)).toBeVisible();
  await page.getByRole("button", { name: "Correct…" }).click();
  await page.getByRole("dialog").getByLabel("Origin").fill("Bought singly");
  await page.getByRole("dialog").getByLabel("Reason").fill("Was forgotten.");
  await page.getByRole("button", { name: "Record the correction" }).click();
  await expect(page.getByRole("list", { name: "History of this board" })).toContainText("origin from nothing to Bought singly. Reason: Was forgotten.");

  await page.goto(`/drives/${driveId}`);
  const line = page.getByRole("table", { name: "Boards of the shelf that fit this drive" }).getByRole("row").filter({ hasText: number });
  await expect(line).toContainText("Another revision: rev D; the original has rev C.");
  await expect(line).toContainText("Reserved for this case.");
  await line.getByRole("button", { name: `Take ${number} for this drive` }).click();
  await page.getByRole("dialog").getByRole("button", { name: "Take it" }).click();
  await expect(page.getByRole("dialog")).toBeHidden();
  await expect(page.getByText("Donor board", { exact: false }).first()).toBeVisible();
  await expect(page.getByText(`No board ${boardNumber} lies on the shelf.`)).toBeVisible();
  await page.goto(`/shelf?q=${number}`);
  await expect(page.getByRole("row").filter({ hasText: number })).toContainText(`Taken for ${ref}, Drive A`);
  await page.getByRole("link", { name: number }).click();
  await expect(page.getByRole("button", { name: "Retire it…" })).toHaveCount(0);
  await expect(page.getByText("Nothing is saved yet.")).toBeVisible();
});

test("the shelf goes out as CSV and comes back without a change; a file is tried before it is taken", async ({ browser }) => {
  test.setTimeout(120_000);
  const boardNumber = fresh();
  const { page } = await signIn(browser, "mira");
  await bring(page, `number;board number;place\n;${boardNumber};=1+1\n;;x\n`);
  await expect(page.getByText("Nothing is changed while a line can’t be taken.")).toBeVisible();
  await expect(page.getByRole("row").filter({ hasText: "Can’t be taken" })).toContainText("board number: Give the board number");
  await expect(page.getByRole("button", { name: /^Import / })).toHaveCount(0);
  await page.getByLabel("Rows, with the header row first").fill(`number;board number;place\n;${boardNumber};=1+1\n`);
  await page.getByRole("button", { name: "Try it" }).click();
  await page.getByRole("button", { name: "Import 1 board" }).click();
  await expect(page.getByText("The shelf now says so.")).toBeVisible();
  await page.goto(`/shelf?q=${encodeURIComponent(boardNumber)}`);
  const [download] = await Promise.all([page.waitForEvent("download"), page.getByRole("link", { name: "Save as CSV" }).click()]);
  const file = await download.path();
  expect(readFileSync(file, "utf8")).toContain(",'=1+1,");
  await page.goto("/shelf/import");
  await page.getByLabel("CSV file of the shelf").setInputFiles(file);
  await page.getByRole("button", { name: "Try it" }).click();
  await expect(page.getByText("Nothing would change.")).toBeVisible();
});

test("an auditor looks and changes nothing", async ({ browser }) => {
  const { page } = await signIn(browser, "rhys");
  await page.goto("/shelf?state=on-shelf");
  await expect(page.getByRole("table", { name: "Donor shelf" }).getByRole("row").nth(1)).toBeVisible();
  await expect(page.getByRole("button", { name: "Put a board on the shelf…" })).toHaveCount(0);
  await page.getByRole("table", { name: "Donor shelf" }).getByRole("link").first().click();
  await expect(page.getByRole("heading", { name: "History" })).toBeVisible();
  await expect(page.getByRole("button", { name: "Correct…" })).toHaveCount(0);
});
