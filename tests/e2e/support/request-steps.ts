import { expect, type Page } from "@playwright/test";

export interface Wish {
  name: string;
  email: string;
  partNumber: string;
  serial?: string;
  boardNumber?: string;
  happened?: string;
}

/** Fills the public form in as a customer does; the four lines of the leave are ticked and signed. */
export async function fillRequest(page: Page, wish: Wish): Promise<void> {
  await page.getByLabel("Name", { exact: true }).fill(wish.name);
  await page.getByLabel("E-mail for the link and the summary").fill(wish.email);
  await page.getByLabel("Address the parcel goes back to").fill("3 Mill Row\nFennick ZZ0 4AA");
  await page.getByRole("textbox", { name: "Part number on the enclosure" }).fill(wish.partNumber);
  if (wish.serial) await page.getByRole("textbox", { name: "Serial number" }).fill(wish.serial);
  if (wish.boardNumber) await page.getByRole("textbox", { name: "Board number" }).fill(wish.boardNumber);
  else await page.getByLabel(/^I can’t see the board number/).check();
  await page.getByLabel("Yes, and I send it along with its small board").check();
  await page.getByRole("radiogroup", { name: "Is a password or encryption on it?" }).getByLabel("I don’t know").check();
  await page.getByLabel("Power surge or lightning").check();
  await page.getByLabel("In your own words").fill(wish.happened ?? "A storm in the night; it did not spin in the morning.");
  await page.getByLabel("Work waits for it").check();
  for (const line of ["I own this drive", "You may read the chips", "You may write one image", "Where a clip can’t reach"]) await page.getByLabel(new RegExp(`^${line}`)).check();
  await page.getByLabel("Type your name as signature").fill(wish.name);
}

/** Sends the form and waits for the private page; answers the case number with its check character and the link's path. */
export async function sendRequest(page: Page): Promise<{ refChecked: string; path: string }> {
  // the server takes nothing that was filled in faster than anyone types
  await page.waitForTimeout(3000);
  await page.getByRole("button", { name: "Send the request" }).click();
  const heading = page.getByRole("heading", { level: 1, name: /^Your case \d\d-\d{4}\.[0-9A-Z]$/ });
  await expect(heading).toBeVisible({ timeout: 20_000 });
  return { refChecked: (await heading.innerText()).replace(/^Your case\s+/, "").trim(), path: new URL(page.url()).pathname };
}
