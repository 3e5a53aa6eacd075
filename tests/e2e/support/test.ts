import { type BrowserContext, test as base, expect } from "@playwright/test";
import { layoutShifts, SHIFT } from "./layout-shifts";

/** A trouble that a test asks for; one that does not come is as wrong as one that nobody expected. */
interface Expected {
  pattern: RegExp;
  came: boolean;
}

/** What went wrong in any page since the last test ended, as "409 POST /api/…", "error: …", "warning: …", "script: …", "layout shift …". */
let troubles: string[] = [];
let expected: Expected[] = [];
let open: BrowserContext[] = [];

/** Says which trouble this test asks for, as narrowly as it can be named: `expectTrouble(/^409 POST \/api\/cases\/\S+\/hold$/)`. */
export function expectTrouble(pattern: RegExp): void {
  expected.push({ pattern, came: false });
}

const place = (url: string) => url.replace(/^https?:\/\/127\.0\.0\.1:\d+(?=\/)/, "");

function watch(context: BrowserContext): void {
  open.push(context);
  context.on("close", () => { open = open.filter((one) => one !== context); });
  /** addresses whose refusal is on record, since the browser's console tells of each once more */
  const told = new Set<string>();
  context.on("response", (response) => {
    if (response.status() < 400) return;
    told.add(response.url());
    troubles.push(`${response.status()} ${response.request().method()} ${place(response.url())}`);
  });
  context.on("requestfailed", (request) => {
    told.add(request.url());
    // a prefetch or refresh that the browser gave up because the page went on is no fault, nor is a download
    const why = request.failure()?.errorText ?? "";
    if (why !== "net::ERR_ABORTED") troubles.push(`${why} ${request.method()} ${place(request.url())}`);
  });
  context.on("console", (message) => {
    const [kind, text] = [message.type(), message.text()];
    if (text.startsWith(SHIFT)) troubles.push(place(text));
    else if (kind !== "error" && kind !== "warning") return;
    else if (!(text.startsWith("Failed to load resource: ") && told.has(message.location().url))) troubles.push(`${kind}: ${text} (${place(message.location().url)})`);
  });
  context.on("weberror", (error) => troubles.push(`script: ${error.error().message} (${place(error.page()?.url() ?? "")})`));
  // sent before whatever the test asks of the context
  void context.addInitScript(layoutShifts, SHIFT).catch(() => undefined);
}

/** Playwright's `test`, which also fails for a trouble in any page that nobody expected. Each spec imports this one. */
export const test = base.extend<{ watched: void }, { browser: import("@playwright/test").Browser }>({
  browser: [async ({ browser }, use) => {
    browser.on("context", watch);
    await use(browser);
  }, { scope: "worker" }],
  watched: [async ({}, use, testInfo) => {
    const kept = [...open];
    await use();
    // a page that a test leaves open would go on asking the server
    for (const context of open.filter((one) => !kept.includes(one))) await context.close();
    const unexpected = troubles.filter((trouble) => expected.filter(({ pattern }) => pattern.test(trouble)).map((one) => (one.came = true)).length === 0);
    const missing = testInfo.errors.length > 0 ? [] : expected.filter(({ came }) => !came).map(({ pattern }) => `expected, but did not come: ${pattern}`);
    troubles = [];
    expected = [];
    expect([...unexpected, ...missing], "troubles in the browser").toEqual([]);
  }, { auto: true }],
});
