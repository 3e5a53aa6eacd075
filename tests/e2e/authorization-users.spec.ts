import { expect, type Page } from "@playwright/test";
import type { UserView } from "@/lib/views";
import { expectAccessible } from "./support/axe";
import { makePair } from "./support/bench";
import { signIn } from "./support/desk";
import { done, tokenOf } from "./support/station";
import { expectTrouble, test } from "./support/test";

/** Where screenshots go, when somebody wants to look. */
const PICTURES = process.env.E2E_PICTURES;

async function picture(page: Page, name: string): Promise<void> {
  if (!PICTURES) return;
  const size = page.viewportSize()!;
  for (const width of [1440, 390]) for (const colorScheme of ["light", "dark"] as const) {
    await page.setViewportSize({ width, height: 900 });
    await page.emulateMedia({ colorScheme });
    await page.screenshot({ path: `${PICTURES}/${name}-${width}-${colorScheme}.png`, fullPage: !name.includes("dialog") });
  }
  await page.setViewportSize(size);
  await page.emulateMedia({ colorScheme: "light" });
}

const users = async () => (await done<{ items: UserView[] }>("GET", "/api/users", { token: await tokenOf("odile") })).items;

test("an admin gives an auditor a case list by keyboard, changes it, and takes it away with the role", async ({ browser }) => {
  test.setTimeout(180_000);
  const mira = await tokenOf("mira");
  const refs: string[] = [];
  for (const customer of ["Harbour Insurers, first claim", "Harbour Insurers, second claim"]) {
    const { caseId } = await makePair(mira, { customer, sizeBytes: 4096 });
    refs.push((await done<{ ref: string }>("GET", `/api/cases/${caseId}`, { token: mira })).ref);
  }
  const { page } = await signIn(browser, "odile");
  await page.goto("/users");
  await page.getByRole("button", { name: "Add a user…" }).click();
  const dialog = page.getByRole("dialog");
  await dialog.getByLabel("Name").fill("Sefton Grale");
  const email = `sefton.${Date.now()}@insurers.example`;
  await dialog.getByLabel("E-mail address").fill(email);
  await expect(dialog.getByLabel("Only these cases")).toHaveCount(0);
  await dialog.getByLabel("Role").selectOption("auditor");
  await dialog.getByLabel("Only these cases").check();
  await dialog.getByRole("button", { name: "Add and show" }).click();
  await expect(dialog.getByText("Choose at least one case, or let the account see every case.")).toBeVisible();
  await expect(dialog.getByText("An account with a case list needs a last day. Give one.")).toBeVisible();
  await picture(page, "dialog-faults");

  const field = dialog.getByRole("combobox", { name: "Cases" });
  await field.fill(refs[0]);
  await expect(dialog.getByRole("option", { name: refs[0] })).toBeVisible();
  await page.keyboard.press("Enter");
  await field.fill("Harbour Insurers");
  await expect(dialog.getByRole("listbox", { name: "Cases that fit" }).getByRole("option")).toHaveText([new RegExp(refs[1])]);
  await picture(page, "dialog-hits");
  await page.keyboard.press("ArrowDown");
  await page.keyboard.press("Enter");
  await expect(dialog.getByRole("list", { name: "Cases on the list" }).getByRole("listitem")).toHaveText([...refs].sort());
  // Escape closes the list of hits, not the form
  await field.fill("zzz");
  await expect(dialog.getByText("No other case fits “zzz”.")).toBeVisible();
  await page.keyboard.press("Escape");
  await expect(dialog.getByText("No other case fits “zzz”.")).toBeHidden();
  await expect(dialog.getByLabel("Name")).toHaveValue("Sefton Grale");
  expectTrouble(/^422 POST \/api\/users$/);
  await dialog.getByLabel("Last day").fill("2020-01-31");
  await dialog.getByRole("button", { name: "Add and show" }).click();
  await expect(dialog.getByText("This day is over already. Give a later one, or switch the account off to end it now.")).toBeVisible();
  await dialog.getByLabel("Last day").fill("2099-01-31");
  await expectAccessible(page, "the dialog", { within: "[role=dialog]" });
  await picture(page, "dialog-filled");
  await dialog.getByRole("button", { name: "Add and show" }).click();
  await page.getByRole("button", { name: "I have passed it on" }).click();

  const row = page.getByRole("row").filter({ hasText: email });
  await expect(row).toContainText(`only ${[...refs].sort().join(", ")}`);
  await expect(row).toContainText("until 31 January 2099");
  await picture(page, "users");

  await row.getByRole("button", { name: "Change…" }).click();
  await dialog.getByRole("button", { name: `Take ${refs[1]} off the list` }).click();
  await expect(field).toBeFocused();
  await dialog.getByRole("button", { name: "Change", exact: true }).click();
  await expect(dialog).toBeHidden();
  await expect(row).toContainText(`only ${refs[0]}`);
  expect((await users()).find((one) => one.email === email)).toMatchObject({ cases: [{ ref: refs[0] }], endsOn: "2099-01-31" });

  await row.getByRole("button", { name: "Change…" }).click();
  await dialog.getByLabel("Role").selectOption("technician");
  await expect(dialog.getByText("With this role the limits of the account go.")).toBeVisible();
  await expect(dialog.getByText(`It is limited to ${refs[0]}, until 31 January 2099.`)).toBeVisible();
  await picture(page, "dialog-role");
  await dialog.getByRole("button", { name: "Change", exact: true }).click();
  await expect(dialog).toBeHidden();
  expect((await users()).find((one) => one.email === email)).toMatchObject({ role: "technician", cases: null, endsOn: null });
  await page.goto("/custody/workshop");
  await expect(page.getByText(`role from auditor to technician, cases from ${refs[0]} to every case, ends from 2099-01-31 to nothing`)).toBeVisible();
});
