import { type Browser, expect } from "@playwright/test";
import { emailOf, type Person, passwordOf } from "./accounts";
import { type Content, STORED, readRow } from "./chip-steps";
import { openDesk } from "./desk";
import { Keyboard } from "./keyboard";

/** The steps of case-steps, chip-steps and end-steps, without a pointer. */

export async function signInByKeys(browser: Browser, person: Person): Promise<Keyboard> {
  const { page } = await openDesk(browser);
  await page.goto("/sign-in");
  const keys = new Keyboard(page);
  await keys.type(page.getByLabel("E-mail address"), emailOf(person));
  await keys.type(page.getByLabel("Password"), passwordOf(person));
  await keys.key("Enter");
  await expect(page.getByRole("heading", { level: 1, name: "Bench", exact: true })).toBeVisible();
  await keys.skip();
  return keys;
}

/** Gives the case's number. */
export async function recordCase(keys: Keyboard, { customer, email, damage }: { customer: string; email: string; damage: string }): Promise<string> {
  const { page } = keys;
  await keys.key("?");
  const list = page.getByRole("dialog", { name: "Keys and pages" });
  await expect(list).toBeVisible();
  await keys.key(String((await list.getByRole("link").allTextContents()).indexOf("Cases") + 1));
  await expect(page.getByRole("heading", { level: 1, name: "Cases" })).toBeVisible();
  await keys.press(page.getByRole("link", { name: "Record a case" }));
  await keys.type(page.getByLabel("Customer"), customer);
  await keys.type(page.getByLabel("E-mail address"), email);
  await keys.type(page.getByLabel("Damage"), damage);
  await keys.press(page.getByRole("button", { name: "Record the case" }));
  const heading = page.getByRole("heading", { level: 1, name: /^\d\d-\d{4}$/ });
  await expect(heading).toBeVisible();
  return (await heading.innerText()).trim();
}

export async function addDrive(keys: Keyboard, { partNumber, serial }: { partNumber: string; serial: string }): Promise<void> {
  const { page } = keys;
  await keys.press(page.getByRole("button", { name: "Add a drive…" }));
  const dialog = page.getByRole("dialog", { name: "Add a drive" });
  await keys.type(dialog.getByLabel("Part number"), partNumber);
  await keys.type(dialog.getByLabel("Serial number"), serial);
  await keys.press(dialog.getByRole("button", { name: "Add the drive" }));
  await expect(dialog).toBeHidden();
  await expect(page.getByRole("heading", { level: 2, name: "Drive A" })).toBeVisible();
}

export async function addBoard(keys: Keyboard, role: "original" | "donor", { boardNumber, revision }: { boardNumber: string; revision: string }): Promise<void> {
  const { page } = keys;
  const title = role === "original" ? "Add the original board" : "Add a donor board";
  await keys.press(page.getByRole("button", { name: `${title}…` }));
  const dialog = page.getByRole("dialog", { name: title });
  await keys.type(dialog.getByLabel("Board number"), boardNumber);
  await keys.type(dialog.getByLabel("Revision"), revision);
  if (role === "donor") await expect(dialog.getByText("fits", { exact: false }).first()).toBeVisible();
  await keys.press(dialog.getByRole("button", { name: "Add the board" }));
  await expect(dialog).toBeHidden();
}

export async function addChip(keys: Keyboard, role: "original" | "donor", { designator, size }: { designator: string; size: string }): Promise<void> {
  const { page } = keys;
  await keys.press(page.getByRole("figure").filter({ hasText: role === "original" ? "Original board" : "Donor board" }).getByRole("button", { name: "Add a chip…" }));
  const dialog = page.getByRole("dialog", { name: /^Add a chip on/ });
  // the donor's form begins with the original's next chip
  if (role === "donor") await expect(dialog.getByLabel("Designator")).toHaveValue(designator);
  await keys.type(dialog.getByLabel("Designator"), designator);
  await keys.type(dialog.getByLabel("Size", { exact: true }), size);
  await keys.choose(dialog.getByLabel("Supply"), "3300");
  if (role === "donor") await expect(dialog.getByLabel("Stands for which original chip").locator("option:checked")).toHaveText(`Original ${designator}`);
  await keys.press(dialog.getByRole("button", { name: "Add the chip", exact: true }));
  await expect(dialog).toBeHidden();
}

/** From any page: `/`, the case's number, the case, the chip. */
export async function findCase(keys: Keyboard, ref: string): Promise<void> {
  const { page } = keys;
  await keys.key("/");
  await expect(page.getByLabel("Find a case, serial or digest").first()).toBeFocused();
  await page.keyboard.type(ref);
  await keys.key("Enter");
  await expect(page).toHaveURL(/\/find\?/);
  await keys.skip();
  await keys.press(page.getByRole("link", { name: ref }).first());
  await expect(page.getByRole("heading", { level: 1, name: ref })).toBeVisible();
}

export async function findChip(keys: Keyboard, ref: string, designator: string): Promise<void> {
  const { page } = keys;
  await findCase(keys, ref);
  await keys.press(page.getByRole("link", { name: `Open ${designator}`, exact: true }).first());
  await expect(page.getByRole("heading", { level: 1, name: designator })).toBeVisible();
}

export async function upload(keys: Keyboard, content: Content, seating: number, files: string[]): Promise<void> {
  const { page } = keys;
  await keys.choose(page.getByLabel("Which content is it?"), content);
  await keys.choose(page.getByLabel("Seating", { exact: true }), String(seating));
  await keys.type(page.getByLabel("Reader", { exact: true }), "R2");
  await keys.choose(page.getByLabel("Supply set in the reader"), "3300");
  const stored = page.getByRole("list", { name: "Files" }).getByText(STORED[content]);
  const before = await stored.count();
  const chooser = page.waitForEvent("filechooser");
  await keys.press(page.getByRole("button", { name: "Choose files" }));
  await (await chooser).setFiles(files);
  await expect(stored).toHaveCount(before + files.length, { timeout: 20_000 });
  for (const name of await stored.allInnerTexts()) await expect(readRow(page, name.replace("Stored as ", ""))).toBeVisible();
}

export async function askForApproval(keys: Keyboard, message: string): Promise<void> {
  const { page } = keys;
  await keys.type(page.getByLabel("Message to the lead"), message);
  await keys.press(page.getByRole("button", { name: "Ask for approval" }));
  await expect(page.getByText(`“${message}”`)).toBeVisible();
}

export async function sign(keys: Keyboard, sha256: string): Promise<void> {
  const { page } = keys;
  await expect(page.getByRole("heading", { level: 2, name: "For and against" })).toBeVisible();
  for (const tick of await page.getByRole("checkbox", { name: /^Looked at/ }).all()) await keys.tick(tick);
  await keys.type(page.getByLabel("Statement"), "Three clean reads in two seatings.");
  await keys.type(page.getByLabel("Last 8 digits of the SHA-256, typed from above"), sha256.slice(-8));
  await keys.press(page.getByRole("button", { name: /^Approve for writing to donor/ }));
  await expect(page.getByRole("heading", { level: 2, name: "Signed" })).toBeVisible();
}

export async function recordWrite(keys: Keyboard): Promise<void> {
  const { page } = keys;
  await keys.press(page.getByRole("button", { name: "Record the transfer…" }));
  const dialog = page.getByRole("dialog", { name: "Record the transfer" });
  const written = dialog.getByLabel("The approved image was written");
  if (!(await written.isChecked())) await keys.tick(written);
  await keys.type(dialog.getByLabel("Programmer or tool"), "R2");
  await keys.press(dialog.getByRole("button", { name: "Record the transfer" }));
  await expect(dialog).toBeHidden();
}

export async function sendSummary(keys: Keyboard): Promise<void> {
  const { page } = keys;
  await keys.press(page.getByRole("button", { name: "Send summary…" }));
  await keys.press(page.getByRole("dialog").getByRole("button", { name: "Send it" }));
  await expect(page.getByRole("dialog")).toBeHidden();
}
