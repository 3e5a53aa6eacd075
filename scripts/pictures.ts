import { mkdirSync } from "node:fs";
import path from "node:path";
import type { Browser, Page } from "@playwright/test";
import { atTheDemo, openChip, pathFor, signedIn, visitor } from "./pictures/demo";

// `npm run pictures`: the README's pictures, taken from the demo that runs on this data folder.
const target = path.join(import.meta.dirname, "../docs/pictures");

async function take(page: Page, name: string, height?: number): Promise<void> {
  await page.waitForLoadState("networkidle");
  await page.evaluate(() => document.fonts.ready);
  const width = page.viewportSize()!.width;
  await page.screenshot({ path: path.join(target, `${name}.png`), ...(height ? { clip: { x: 0, y: 0, width, height }, fullPage: true } : {}) });
  console.log(`docs/pictures/${name}.png`);
}

/** The public form as somebody has begun to fill it in. */
async function fillForm(page: Page): Promise<void> {
  await page.goto("/request");
  await page.waitForLoadState("networkidle");
  for (const [label, text] of [
    ["Name", "Corin Ashdale"], ["E-mail for the link and the summary", "corin@ashdale.example"], ["Address the parcel goes back to", "Ashdale Bookbinders\n8 Cooper's Row\nFennick ZZ1 4QT"],
  ]) await page.getByLabel(label, { exact: true }).fill(text);
  await page.getByRole("textbox", { name: "Part number on the enclosure" }).fill("PN 2214-0066-A");
  await page.getByRole("textbox", { name: "Serial number" }).fill("TT41-1310-E2");
}

async function takeAll(browser: Browser): Promise<void> {
  const mira = await signedIn(browser, "mira");
  await take(mira, "bench", 1000);
  await openChip(mira, "Harrow & Finch Surveyors", "U3");
  await take(mira, "chip", 1300);
  const chip = new URL(mira.url()).pathname;
  await mira.getByRole("link", { name: /^Case \d/ }).first().click();
  await mira.waitForURL(/\/cases\/[0-9a-f-]{36}$/);
  await take(mira, "case", 1200);
  await mira.getByRole("link", { name: /^Custody log, \d+ entries$/ }).first().click();
  await mira.waitForURL(/\/custody$/);
  await mira.getByRole("button", { name: "Check the log" }).click();
  await mira.getByText(/entries link\./).waitFor();
  await take(mira, "log", 1100);

  const ines = await signedIn(browser, "ines");
  await openChip(ines, "Halden Ropeworks", "U3");
  await ines.getByRole("link", { name: "Open the decision sheet" }).first().click();
  await ines.getByRole("heading", { name: "For and against" }).waitFor();
  await take(ines, "decision-sheet", 1240);

  const night = await signedIn(browser, "mira", { night: true });
  await night.goto(chip);
  await take(night, "chip-night", 1000);
  const phone = await signedIn(browser, "mira", { width: 390, height: 844 });
  await phone.goto(chip);
  await take(phone, "chip-390", 1600);

  const customer = await visitor(browser);
  await fillForm(customer);
  await take(customer, "request", 1300);
  await customer.goto(`${await pathFor("corin@ashdale.example", "request")}/slip`);
  await take(customer, "slip", 1290);
  await customer.goto(await pathFor("jory.kemble@kemble.example", "summary"));
  await take(customer, "summary", 1136);
}

mkdirSync(target, { recursive: true });
await atTheDemo(takeAll);
