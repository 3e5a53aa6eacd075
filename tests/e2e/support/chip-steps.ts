import { expect, type Page } from "@playwright/test";

export type Content = "before" | "donor" | "after";
/** What the list of files says of one that is there. */
export const STORED: Record<Content, RegExp> = { before: /^Stored as Read \d+$/, donor: /^Stored as Own \d+$/, after: /^Stored as Back \d+$/ };

/** Uploads files of one seating at once, through the picker, and waits until each is stored. */
export async function upload(page: Page, content: Content, seating: number, files: string[], { sendAnyway = false } = {}): Promise<void> {
  await page.getByLabel("Which content is it?").selectOption(content);
  await page.getByLabel("Seating", { exact: true }).selectOption(String(seating));
  await page.getByLabel("Reader", { exact: true }).fill("R2");
  await page.getByLabel("Adapter", { exact: true }).fill("SOIC-8 clip C4");
  await page.getByLabel("Supply set in the reader").selectOption("3300");
  const list = page.getByRole("list", { name: "Files" });
  const stored = list.getByText(STORED[content]);
  const before = await stored.count();
  const chooser = page.waitForEvent("filechooser");
  await page.getByRole("button", { name: "Choose files" }).click();
  await (await chooser).setFiles(files);
  if (sendAnyway) await list.getByRole("button", { name: "Send anyway" }).click();
  await expect(stored).toHaveCount(before + files.length, { timeout: 20_000 });
  // the page learns of the reads after the upload's own answer: the next seating counts from them
  for (const name of await stored.allInnerTexts()) {
    await expect(readRow(page, name.replace("Stored as ", ""))).toBeVisible();
  }
}

/** The line of "Read 2" in the table of reads. */
export const readRow = (page: Page, name: string | RegExp) =>
  page.getByRole("table", { name: /^Reads of/ }).getByRole("row").filter({ has: page.getByRole("rowheader", { name, exact: true }) });

/** The section with the verdict: the sentence, why, and the matrix. */
export const verdict = (page: Page) => page.locator("section").filter({ has: page.getByRole("heading", { level: 2, name: "What was found" }) });

/** The state as the board panel names it. */
export const state = (page: Page) => page.locator(".board .font-strong");

export async function askForApproval(page: Page, message: string): Promise<void> {
  await page.getByLabel("Message to the lead").fill(message);
  await page.getByRole("button", { name: "Ask for approval" }).click();
  await expect(page.getByText(`“${message}”`)).toBeVisible();
}

/** Looks at everything, types the last eight digits from the sheet, signs. */
export async function sign(page: Page, sha256: string): Promise<void> {
  await expect(page.getByRole("heading", { level: 2, name: "For and against" })).toBeVisible();
  for (const tick of await page.getByRole("checkbox", { name: /^Looked at/ }).all()) await tick.check();
  await page.getByLabel("Statement").fill("Three clean reads in two seatings.");
  await page.getByLabel("Last 8 digits of the SHA-256, typed from above").pressSequentially(sha256.slice(-8));
  await page.getByRole("button", { name: /^Approve for writing to donor/ }).click();
  await expect(page.getByRole("heading", { level: 2, name: "Signed" })).toBeVisible();
}

export async function recordWrite(page: Page): Promise<void> {
  await page.getByRole("button", { name: "Record the transfer…" }).click();
  const dialog = page.getByRole("dialog", { name: "Record the transfer" });
  await dialog.getByLabel("The approved image was written").check();
  await dialog.getByLabel("Programmer or tool").fill("R2");
  await dialog.getByRole("button", { name: "Record the transfer" }).click();
  await expect(dialog).toBeHidden();
}
