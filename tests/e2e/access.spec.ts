import { expect, type Page } from "@playwright/test";
import { TOPICS } from "@/components/help/topics";
import type { BenchRow, CaseRow, ChipView, ListView } from "@/lib/views";
import { expectAccessible } from "./support/axe";
import type { Person } from "./support/accounts";
import { openDesk, signIn } from "./support/desk";
import { expectTrouble, test } from "./support/test";

const AUDIT = ["", "/drives", "/seals", "/images", "/assessments", "/hand-outs", "/refusals", "/sign-ins", "/sign-ins/tokens", "/sign-ins/limits", "/clock"];

/** Every page: on a phone nothing wider than the window; widened again nothing axe finds, in either theme. */
async function look(page: Page, paths: readonly string[]): Promise<void> {
  for (const path of paths) {
    await page.setViewportSize({ width: 390, height: 900 });
    await page.goto(path);
    for (const width of [390, 1440]) {
      await page.setViewportSize({ width, height: 900 });
      const wider = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
      expect(wider, `${path}, ${width} px: wider than the window`).toBeLessThanOrEqual(0);
    }
    // the same page on a phone is the same to axe, and takes its time again
    for (const theme of ["light", "dark"] as const) {
      await page.emulateMedia({ colorScheme: theme });
      await expectAccessible(page, `${path}, ${theme}`, { theme });
    }
    await page.emulateMedia({ colorScheme: "light" });
  }
}

/** One chip of each state on the bench, with its page, its comparison and, for leads, its decision sheet. */
async function chipPaths(page: Page, person: Person): Promise<string[]> {
  const { items } = (await (await page.request.get("/api/bench")).json()) as { items: BenchRow[] };
  const states = [...new Map(items.map((row) => [row.chip.state.state, row])).values()];
  const read = states.filter((row) => row.chip.countedReads > 1);
  const first = (await (await page.request.get(`/api/chips/${states[0].chip.id}/view`)).json()) as ChipView;
  if (person !== "mira") return read.map((row) => `/chips/${row.chip.id}/decision`);
  return [...states.map((row) => `/chips/${row.chip.id}`), `/chips/${read[0].chip.id}/compare`, `/drives/${first.drive.id}`, `/drives/${first.drive.id}/custody`];
}

test("the sign-in page and an address that holds nothing", async ({ browser }) => {
  expectTrouble(/^404 GET \/nothing-here$/);
  const { page } = await openDesk(browser);
  await look(page, ["/sign-in", "/nothing-here"]);
});

test("the help, signed in and not", async ({ browser }) => {
  test.setTimeout(400_000);
  const { page } = await openDesk(browser);
  await look(page, ["/help", ...TOPICS.map(({ key }) => `/help/${key}`)]);
  await look((await signIn(browser, "mira")).page, ["/help", "/help/reads", "/help/findings"]);
});

test("a technician's pages", async ({ browser }) => {
  test.setTimeout(400_000);
  const { page } = await signIn(browser, "mira");
  const { items } = (await (await page.request.get("/api/cases?pageSize=3")).json()) as ListView<CaseRow>;
  await look(page, ["/bench", "/bench?who=mine", "/cases", "/cases?q=nothing+of+the+kind", "/cases/new", ...items.map((row) => `/cases/${row.id}`), ...(await chipPaths(page, "mira")), "/custody", "/find?q=26", "/account", "/policy"]);
});

test("a lead's decision sheets", async ({ browser }) => {
  test.setTimeout(200_000);
  const { page } = await signIn(browser, "ines");
  await look(page, await chipPaths(page, "ines"));
});

test("an admin's and an auditor's pages", async ({ browser }) => {
  test.setTimeout(400_000);
  await look((await signIn(browser, "odile")).page, ["/users", "/policy", "/outbox"]);
  await look((await signIn(browser, "rhys")).page, ["/custody/workshop", "/bench", ...AUDIT.map((path) => `/audit${path}`)]);
});

test("a dialog takes the focus into its first field and gives it back", async ({ browser }) => {
  const { page } = await signIn(browser, "mira");
  const { items } = (await (await page.request.get("/api/cases?state=open&pageSize=1")).json()) as ListView<CaseRow>;
  await page.goto(`/cases/${items[0].id}`);
  const opener = page.getByRole("button", { name: "Add a drive…" });
  await opener.focus();
  await page.keyboard.press("Enter");
  await expect(page.getByRole("dialog").getByRole("textbox").first()).toBeFocused();
  await page.keyboard.press("Escape");
  await expect(opener).toBeFocused();
});
