import { existsSync, mkdirSync, readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { type Browser, chromium, type Page } from "@playwright/test";
import { simpleParser } from "mailparser";
import { env } from "@/lib/env";

// `npm run pictures`: the README's pictures, taken from the demo that runs on this data folder.
const { publicUrl, dataDir, demo } = env();
const target = path.join(import.meta.dirname, "../docs/pictures");

class Missing extends Error {}

interface Look {
  width?: number;
  height?: number;
  night?: boolean;
}

/** A person's own browser at the bench. */
async function signedIn(browser: Browser, person: string, { width = 1440, height = 1000, night = false }: Look = {}): Promise<Page> {
  const page = await browser.newPage({ baseURL: publicUrl, viewport: { width, height }, colorScheme: night ? "dark" : "light", locale: "en-GB" });
  const email = `${person}@alderlane.example`;
  const line = readFileSync(path.join(dataDir, "first-sign-in.txt"), "utf8").split("\n").find((one) => one.startsWith(`${email} `));
  if (!line) throw new Missing(`first-sign-in.txt has no line for ${email}. Take the pictures of a fresh demo.`);
  await page.goto("/sign-in");
  await page.getByLabel("E-mail address").fill(email);
  await page.getByLabel("Password").fill(line.slice(email.length + 1));
  await page.getByRole("button", { name: "Sign in" }).click();
  await page.waitForURL("**/bench");
  return page;
}

async function take(page: Page, name: string, height?: number): Promise<void> {
  await page.waitForLoadState("networkidle");
  await page.evaluate(() => document.fonts.ready);
  const width = page.viewportSize()!.width;
  await page.screenshot({ path: path.join(target, `${name}.png`), ...(height ? { clip: { x: 0, y: 0, width, height }, fullPage: true } : {}) });
  console.log(`docs/pictures/${name}.png`);
}

/** The page of one chip, by its customer and name. */
async function openChip(page: Page, customer: string, designator: string): Promise<void> {
  await page.goto(`/cases?q=${encodeURIComponent(customer)}`);
  await page.getByRole("row").filter({ hasText: customer }).getByRole("link").first().click();
  await page.getByRole("region", { name: "Drive A" }).getByRole("link", { name: `Open ${designator}`, exact: true }).click();
  await page.waitForURL(/\/chips\/[0-9a-f-]{36}$/);
}

/** The path of a private link that a customer of the demo got by mail. */
async function pathFor(customer: string, page: "request" | "summary"): Promise<string> {
  const folder = path.join(dataDir, "mail-fake");
  for (const name of existsSync(folder) ? readdirSync(folder) : []) {
    if (!name.endsWith(".eml")) continue;
    const mail = await simpleParser(readFileSync(path.join(folder, name)));
    const link = [mail.to ?? []].flat().some((to) => to.text.includes(customer)) ? new RegExp(`/${page}/[\\w-]{43}`).exec(mail.text ?? "") : null;
    if (link) return link[0];
  }
  throw new Missing(`No mail to ${customer} with a link to the ${page} lies in the mail fake's folder yet. Wait until the demo has sent it.`);
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

  const customer = await browser.newPage({ baseURL: publicUrl, viewport: { width: 1440, height: 1000 }, locale: "en-GB" });
  await fillForm(customer);
  await take(customer, "request", 1300);
  await customer.goto(`${await pathFor("corin@ashdale.example", "request")}/slip`);
  await take(customer, "slip", 1290);
  await customer.goto(await pathFor("jory.kemble@kemble.example", "summary"));
  await take(customer, "summary", 1136);
}

const running = await fetch(`${publicUrl}/api/health`).then((answer) => answer.ok, () => false);
const browser = running && demo ? await chromium.launch({ executablePath: process.env.CHROMIUM ?? "/usr/bin/chromium", args: ["--no-sandbox", "--disable-gpu"] }) : null;
try {
  if (!browser) throw new Missing(`No demo answers at ${publicUrl}. Start it with npm start, then take the pictures.`);
  mkdirSync(target, { recursive: true });
  await takeAll(browser);
} catch (error) {
  if (!(error instanceof Missing)) throw error;
  console.error(error.message);
  process.exitCode = 1;
} finally {
  await browser?.close();
}
