import { expect, type Page } from "@playwright/test";
import { mailsTo } from "./mails";

/** What is done on the pages of a case and its drive once its chips are verified. */

export async function sendSummary(page: Page): Promise<void> {
  await page.getByRole("button", { name: "Send summary…" }).click();
  await page.getByRole("dialog").getByRole("button", { name: "Send it" }).click();
  await expect(page.getByRole("dialog")).toBeHidden();
}

/** The private link to the summary, as the customer finds it in the mail. */
export async function summaryLink(email: string): Promise<string> {
  let link: string | undefined;
  await expect.poll(() => (link = /https?:\/\/\S+\/summary\/[\w-]{43}/.exec(mailsTo(email).join("\n"))?.[0]), { timeout: 30_000 }).toBeTruthy();
  return link!;
}

/** On the drive's page. */
export async function recordStartUp(page: Page, serial: string): Promise<void> {
  await page.getByRole("button", { name: "Record a start-up test…" }).click();
  const dialog = page.getByRole("dialog", { name: "Record the start-up test" });
  await dialog.getByRole("radio", { name: "It spins" }).check();
  await dialog.getByRole("radio", { name: "It gets ready" }).check();
  await dialog.getByLabel("Serial that the drive reports").fill(serial);
  await dialog.getByRole("button", { name: "Record the test" }).click();
  await expect(dialog).toBeHidden();
}

/** On the drive's page: the line of one thing in the table of where things are. */
export const itemRow = (page: Page, name: string) =>
  page.getByRole("table", { name: "Where each item is" }).getByRole("row").filter({ has: page.getByRole("rowheader", { name, exact: true }) });

/** One hands it over on the drive's page, the other confirms on the same. */
export async function handOver(from: Page, to: Page, item: string, receiver: { name: string; role: string; place: string }): Promise<void> {
  await itemRow(from, item).getByRole("button", { name: "Hand over…" }).click();
  const dialog = from.getByRole("dialog", { name: `Hand over ${item}` });
  await dialog.getByLabel("From where").fill("Bench 2");
  await dialog.getByLabel("To whom").selectOption({ label: `${receiver.name} (${receiver.role})` });
  await dialog.getByLabel("To where").fill(receiver.place);
  await dialog.getByLabel("Condition").fill("Donor board fitted, in its bag");
  await dialog.getByRole("button", { name: "Record the hand-over" }).click();
  await expect(dialog).toBeHidden();
  await expect(itemRow(from, item)).toContainText(`On its way to ${receiver.name}, ${receiver.place}. ${receiver.name} confirms.`);
  await to.goto(from.url());
  await itemRow(to, item).getByRole("button", { name: "Confirm…" }).click();
  await to.getByRole("dialog", { name: `Confirm having ${item}` }).getByRole("button", { name: "Confirm", exact: true }).click();
  await expect(to.getByRole("dialog")).toBeHidden();
  await expect(itemRow(to, item)).toContainText(`${receiver.name}, ${receiver.place}`);
}
