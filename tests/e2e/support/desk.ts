import { type Browser, type BrowserContext, expect, type Page } from "@playwright/test";
import { emailOf, type Person, passwordOf } from "./accounts";

/** One person at a browser of their own. */
export interface Desk {
  page: Page;
  context: BrowserContext;
  /** what went wrong in the browser so far: console errors, requests without an answer or with an error */
  troubles: string[];
}

export async function openDesk(browser: Browser): Promise<Desk> {
  const context = await browser.newContext({ acceptDownloads: true, viewport: { width: 1440, height: 1000 } });
  const troubles: string[] = [];
  context.on("console", (message) => {
    if (message.type() === "error") troubles.push(`console: ${message.text()} (${message.location().url})`);
  });
  context.on("weberror", (error) => troubles.push(`script: ${error.error().message}`));
  context.on("response", (response) => {
    if (response.status() >= 400) troubles.push(`${response.status()} ${response.request().method()} ${response.url()}`);
  });
  context.on("requestfailed", (request) => {
    // a prefetch that the browser gave up because the page went on is no fault
    const why = request.failure()?.errorText ?? "";
    if (why !== "net::ERR_ABORTED") troubles.push(`${why} ${request.method()} ${request.url()}`);
  });
  return { page: await context.newPage(), context, troubles };
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
