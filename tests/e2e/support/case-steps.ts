import { expect, type Page } from "@playwright/test";

/** What a technician does on the pages of a case. */

export async function recordCase(page: Page, { customer, email, damage }: { customer: string; email: string; damage: string }): Promise<string> {
  await page.getByRole("link", { name: "Record a case" }).first().click();
  await page.getByLabel("Customer").fill(customer);
  await page.getByLabel("E-mail address").fill(email);
  await page.getByLabel("Damage").fill(damage);
  await page.getByRole("button", { name: "Record the case" }).click();
  await expect(page.getByRole("heading", { level: 1, name: /^\d\d-\d{4}$/ })).toBeVisible();
  return page.url();
}

export async function addDrive(page: Page, { partNumber, serial }: { partNumber: string; serial: string }): Promise<void> {
  await page.getByRole("button", { name: "Add a drive…" }).click();
  const dialog = page.getByRole("dialog", { name: "Add a drive" });
  await dialog.getByLabel("Part number").fill(partNumber);
  await dialog.getByLabel("Serial number").fill(serial);
  await dialog.getByRole("button", { name: "Add the drive" }).click();
  await expect(dialog).toBeHidden();
  await expect(page.getByRole("heading", { level: 2, name: "Drive A" })).toBeVisible();
}

export async function addBoard(page: Page, role: "original" | "donor", { boardNumber, revision }: { boardNumber: string; revision: string }): Promise<void> {
  const title = role === "original" ? "Add the original board" : "Add a donor board";
  await page.getByRole("button", { name: `${title}…` }).click();
  const dialog = page.getByRole("dialog", { name: title });
  await dialog.getByLabel("Board number").fill(boardNumber);
  await dialog.getByLabel("Revision").fill(revision);
  if (role === "donor") await expect(dialog.getByText("fits", { exact: false }).first()).toBeVisible();
  await dialog.getByRole("button", { name: "Add the board" }).click();
  await expect(dialog).toBeHidden();
  await expect(boardFigure(page, role)).toBeVisible();
}

const boardFigure = (page: Page, role: "original" | "donor") =>
  page.getByRole("figure").filter({ hasText: role === "original" ? "Original board" : "Donor board" });

/** On the donor board the chip is paired with the original's of the same name. */
export async function addChip(page: Page, role: "original" | "donor", { designator, size }: { designator: string; size: string }): Promise<void> {
  await boardFigure(page, role).getByRole("button", { name: "Add a chip…" }).click();
  const dialog = page.getByRole("dialog", { name: /^Add a chip on/ });
  await dialog.getByLabel("Designator").fill(designator);
  await dialog.getByLabel("Size", { exact: true }).fill(size);
  await dialog.getByLabel("Supply").selectOption("3300");
  await dialog.getByLabel("Package").fill("SOIC-8");
  await dialog.getByLabel("What it holds").fill("Configuration data");
  if (role === "donor") await dialog.getByLabel("Stands for which original chip").selectOption({ label: `Original ${designator}` });
  await dialog.getByRole("button", { name: "Add the chip" }).click();
  await expect(dialog).toBeHidden();
}

export async function openChip(page: Page, caseUrl: string, designator: string): Promise<void> {
  await page.goto(caseUrl);
  await page.getByRole("link", { name: `Open ${designator}`, exact: true }).click();
  await expect(page.getByRole("heading", { level: 1, name: designator })).toBeVisible();
}
