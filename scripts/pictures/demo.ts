import { existsSync, readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { type Browser, chromium, type Page } from "@playwright/test";
import { simpleParser } from "mailparser";
import { env } from "@/lib/env";

// What looks at the running demo of this data folder with a browser: who signs in there, and where things are.
const { publicUrl, dataDir, demo } = env();

/** Something of the demo isn't there; the message says what to do. */
export class Missing extends Error {}

export interface Look {
  width?: number;
  height?: number;
  night?: boolean;
}

/** A browser of somebody's own without an account, such as a customer's. */
export async function visitor(browser: Browser, { width = 1440, height = 1000, night = false }: Look = {}): Promise<Page> {
  const context = await browser.newContext({ baseURL: publicUrl, viewport: { width, height }, colorScheme: night ? "dark" : "light", locale: "en-GB" });
  return context.newPage();
}

/** A person's own browser at the bench. */
export async function signedIn(browser: Browser, person: string, look: Look = {}): Promise<Page> {
  const page = await visitor(browser, look);
  const email = `${person}@alderlane.example`;
  const line = readFileSync(path.join(dataDir, "first-sign-in.txt"), "utf8").split("\n").find((one) => one.startsWith(`${email} `));
  if (!line) throw new Missing(`first-sign-in.txt has no line for ${email}. Start a fresh demo, then try again.`);
  await page.goto("/sign-in");
  await page.getByLabel("E-mail address").fill(email);
  await page.getByLabel("Password").fill(line.slice(email.length + 1));
  await page.getByRole("button", { name: "Sign in" }).click();
  await page.waitForURL("**/bench");
  return page;
}

/** The page of one chip, by its customer and name. */
export async function openChip(page: Page, customer: string, designator: string): Promise<void> {
  await page.goto(`/cases?q=${encodeURIComponent(customer)}`);
  await page.getByRole("row").filter({ hasText: customer }).getByRole("link").first().click();
  await page.getByRole("region", { name: "Drive A" }).getByRole("link", { name: `Open ${designator}`, exact: true }).click();
  await page.waitForURL(/\/chips\/[0-9a-f-]{36}$/);
}

/** The path of a private link that a customer of the demo got by mail. */
export async function pathFor(customer: string, page: "request" | "summary"): Promise<string> {
  const folder = path.join(dataDir, "mail-fake");
  for (const name of existsSync(folder) ? readdirSync(folder) : []) {
    if (!name.endsWith(".eml")) continue;
    const mail = await simpleParser(readFileSync(path.join(folder, name)));
    const link = [mail.to ?? []].flat().some((to) => to.text.includes(customer)) ? new RegExp(`/${page}/[\\w-]{43}`).exec(mail.text ?? "") : null;
    if (link) return link[0];
  }
  throw new Missing(`No mail to ${customer} with a link to the ${page} lies in the mail fake's folder yet. Wait until the demo has sent it.`);
}

/** Does `work` with a browser; where the demo lacks something, says what and ends with 1. */
export async function atTheDemo(work: (browser: Browser) => Promise<void>): Promise<void> {
  const running = await fetch(`${publicUrl}/api/health`).then((answer) => answer.ok, () => false);
  const browser = running && demo ? await chromium.launch({ executablePath: process.env.CHROMIUM ?? "/usr/bin/chromium", args: ["--no-sandbox", "--disable-gpu"] }) : null;
  try {
    if (!browser) throw new Missing(`No demo answers at ${publicUrl}. Start it with npm start, then try again.`);
    await work(browser);
  } catch (error) {
    if (!(error instanceof Missing)) throw error;
    console.error(error.message);
    process.exitCode = 1;
  } finally {
    await browser?.close();
  }
}
