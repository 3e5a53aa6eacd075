import { type Browser, type BrowserContext, expect, type Page } from "@playwright/test";
import { emailOf, type Person, passwordOf } from "./accounts";

/** One person at a browser of their own. */
export interface Desk {
  page: Page;
  context: BrowserContext;
}

export async function openDesk(browser: Browser): Promise<Desk> {
  const context = await browser.newContext({ acceptDownloads: true, viewport: { width: 1440, height: 1000 } });
  return { page: await context.newPage(), context };
}

export async function signIn(browser: Browser, person: Person): Promise<Desk> {
  const desk = await openDesk(browser);
  const { page } = desk;
  await page.goto("/sign-in");
  await page.getByLabel("E-mail address").fill(emailOf(person));
  await page.getByLabel("Password").fill(passwordOf(person));
  await page.getByRole("button", { name: "Sign in" }).click();
  await expect(page.getByRole("heading", { level: 1, name: "Bench", exact: true })).toBeVisible();
  return desk;
}
