import { expect, type Page } from "@playwright/test";
import { recordCase } from "./support/case-steps";
import { signIn } from "./support/desk";
import { test } from "./support/test";

/** Every key that is pressed, so that "quick by keyboard" is a number. */
class Keys {
  count = 0;
  constructor(private readonly page: Page) {}
  async type(text: string): Promise<void> {
    this.count += text.length;
    await this.page.keyboard.type(text);
  }
  async press(key: string, times = 1): Promise<void> {
    this.count += times;
    for (let i = 0; i < times; i += 1) await this.page.keyboard.press(key);
  }
  /** On by Tab to the field of this name. */
  async to(label: string): Promise<void> {
    for (let i = 0; i < 12; i += 1) {
      await this.press("Tab");
      if (await this.page.getByLabel(label, { exact: true }).evaluate((element) => element === document.activeElement).catch(() => false)) return;
    }
    throw new Error(`no way by Tab to ${label}`);
  }
}

/** At 60 keys a minute, one a second, that is two minutes; the other three of five are for reading the labels and for photos. */
const MOST_KEYS = 120;
const NUMBER = "BX 47-5520";
const focused = (page: Page, label: string) => expect(page.getByRole("dialog").getByLabel(label, { exact: true })).toBeFocused();

async function newCase(page: Page, customer: string): Promise<string> {
  await page.goto("/cases");
  return recordCase(page, { customer, email: "keys@typedfast.example", damage: "Lightning stroke" });
}

test("drive, original board, chip, donor board and donor chip are recorded without a hand on the mouse", async ({ browser }) => {
  test.setTimeout(120_000);
  const { page } = await signIn(browser, "mira");
  await newCase(page, "Typed Fast Survey");
  const keys = new Keys(page);
  await page.getByRole("button", { name: "Add a drive…" }).focus();
  await keys.press("Enter");
  await focused(page, "Part number");
  await keys.type("PN 6203-0018-D");
  await keys.press("Tab");
  await keys.type("QF-2207-51-K");
  await keys.press("Enter");

  await expect(page.getByRole("dialog", { name: "Add the original board" })).toBeVisible();
  await focused(page, "Board number");
  await keys.type(NUMBER);
  await keys.press("Tab");
  await keys.type("rev B");
  await keys.press("Enter");

  await expect(page.getByRole("dialog", { name: `Add a chip on the original ${NUMBER} rev B` })).toBeVisible();
  await focused(page, "Designator");
  await keys.type("U12");
  await keys.to("Size");
  await keys.type("4 Mbit");
  await keys.to("Supply");
  await keys.type("3.3");
  await keys.press("Enter");

  await expect(page.getByRole("dialog", { name: "Add a donor board" })).toBeVisible();
  await focused(page, "Board number");
  await expect(page.getByRole("dialog").getByLabel("Board number"), "a donor's number is typed from the donor").toHaveValue("");
  await keys.type(NUMBER);
  await keys.press("Tab");
  await keys.type("rev B");
  await expect(page.getByText("This donor fits.")).toBeVisible();
  await keys.press("Enter");

  await expect(page.getByRole("dialog", { name: `Add a chip on the donor ${NUMBER} rev B` })).toBeVisible();
  await focused(page, "Designator");
  await expect(page.getByRole("dialog").getByLabel("Designator")).toHaveValue("U12");
  await keys.to("Supply");
  await keys.type("3.3");
  await keys.press("Enter");

  await expect(page.getByRole("dialog")).toBeHidden();
  await expect(page.getByRole("figure")).toHaveCount(2);
  await expect(page.getByRole("link", { name: "Open U12", exact: true })).toBeVisible();
  expect(keys.count).toBeLessThan(MOST_KEYS);
});

test("what this person used last is proposed, the serial never; a duplicate serial is told while it is typed", async ({ browser }) => {
  test.setTimeout(120_000);
  const { page } = await signIn(browser, "mira");
  const first = await newCase(page, "First Owner of the Serial");
  const serial = `DUP-${Date.now()}`;
  const fill = async () => {
    await page.getByRole("button", { name: "Add a drive…" }).click();
    const dialog = page.getByRole("dialog", { name: "Add a drive" });
    await dialog.getByLabel("Serial number").fill(serial);
    return dialog;
  };
  let dialog = await fill();
  await dialog.getByLabel("Model").fill("Model M 77");
  await dialog.getByLabel("Interface").fill("SATA");
  await dialog.getByRole("button", { name: "Add the drive" }).click();
  await expect(dialog).toBeHidden();
  const ref = (await page.getByRole("heading", { level: 1 }).innerText()).trim();

  await newCase(page, "Second Owner");
  dialog = await fill();
  await expect(dialog.getByLabel("Interface")).toHaveValue("SATA");
  const list = await dialog.getByLabel("Model").getAttribute("list");
  await expect(page.locator(`[id="${list}"] option`)).toHaveAttribute("value", "Model M 77");
  expect(await dialog.getByLabel("Serial number").getAttribute("list")).toBeNull();
  expect(await page.evaluate(() => JSON.stringify(localStorage))).not.toContain(serial);
  await expect(dialog.getByText(`Duplicate serial in another case: ${ref}.`)).toBeVisible();
  await expect(dialog).not.toContainText("First Owner");
  await dialog.getByLabel("Encrypted?").selectOption("suspected");
  await expect(dialog.getByText("keep the enclosure’s small board and the drive together")).toBeVisible();
  await dialog.getByRole("button", { name: "Add the drive" }).click();
  await expect(dialog).toBeHidden();
  await expect(page.getByText(`Duplicate serial in another case: ${ref}.`)).toBeVisible();
  await page.getByRole("link", { name: `Open case ${ref}` }).click();
  await expect(page).toHaveURL(first);
});

test("two chips are one unit, a swapped name is doubted, and chips are placed by arrow keys and numbers", async ({ browser }) => {
  test.setTimeout(150_000);
  const { page } = await signIn(browser, "mira");
  await newCase(page, "Two Chips Ltd");
  const dialog = page.getByRole("dialog");
  await page.getByRole("button", { name: "Add a drive…" }).click();
  await dialog.getByLabel("Part number").fill("PN 9001-0001-A");
  await dialog.getByLabel("Encrypted?").selectOption("yes");
  await page.keyboard.press("Enter");
  await dialog.getByLabel("Board number").fill("BX 50-0001");
  await page.keyboard.press("Enter");
  for (const [name, button] of [["U12", "Save and add another chip"], ["U14", "Save and go on with the donor board"]]) {
    await expect(dialog.getByLabel("Designator")).toHaveValue("");
    await dialog.getByLabel("Designator").fill(name);
    await dialog.getByLabel("Size", { exact: true }).fill("64 KiB");
    await dialog.getByLabel("Supply").selectOption("1800");
    await dialog.getByRole("button", { name: button }).click();
  }
  await expect(page.getByRole("dialog", { name: "Add a donor board" })).toBeVisible();
  await dialog.getByLabel("Board number").fill("BX 50-0001");
  await page.keyboard.press("Enter");
  await expect(dialog.getByLabel("Designator")).toHaveValue("U12");
  await dialog.getByLabel("Designator").fill("U14");
  await expect(dialog.getByLabel("Stands for which original chip")).toHaveValue(/.+/);
  await expect(dialog.getByLabel("Stands for which original chip").locator("option:checked")).toHaveText("Original U14");
  await dialog.getByLabel("Stands for which original chip").selectOption({ label: "Original U12" });
  await expect(dialog.getByText("Two chips swapped?")).toBeVisible();
  await dialog.getByLabel("Stands for which original chip").selectOption({ label: "Original U14" });
  await expect(dialog.getByText("Two chips swapped?")).toBeHidden();
  await dialog.getByLabel("Supply").selectOption("1800");
  await dialog.getByRole("button", { name: "Save and go on with the next chip" }).click();
  await expect(dialog.getByLabel("Designator")).toHaveValue("U12");
  await dialog.getByLabel("Supply").selectOption("1800");
  await page.keyboard.press("Enter");
  await expect(dialog).toBeHidden();
  await expect(page.getByText("U12 belongs together with U14: both are transferred.")).toBeVisible();

  await page.getByRole("link", { name: "Drive A", exact: true }).click();
  await expect(page.getByText("Encrypted drive: keep the enclosure’s small board and the drive together.")).toBeVisible();
  await page.getByRole("figure").first().getByRole("button", { name: "Place the chips…" }).click();
  const pad = dialog.getByRole("slider", { name: "Place of U12 on the drawing" });
  await pad.focus();
  for (const key of ["ArrowRight", "ArrowRight", "Shift+ArrowDown"]) await page.keyboard.press(key);
  await expect(dialog.getByLabel("From the left, 0 to 1000")).toHaveValue("520");
  await expect(dialog.getByLabel("From the top, 0 to 1000")).toHaveValue("550");
  await expect(pad).toHaveAttribute("aria-valuetext", "52 percent from the left, 55 from the top");
  await dialog.getByLabel("Chip", { exact: true }).selectOption({ label: "U14, not placed yet" });
  await dialog.getByLabel("From the left, 0 to 1000").fill("800");
  await dialog.getByLabel("From the top, 0 to 1000").fill("300");
  await dialog.getByRole("button", { name: "Record 2 places" }).click();
  await expect(dialog).toBeHidden();
  await expect(page.getByText("Placed U14 on the picture of its board")).toBeVisible();

  await page.getByRole("link", { name: "Open U12", exact: true }).first().click();
  await expect(page.getByText("U12 belongs together with U14: both are transferred. Now U14: To read.")).toBeVisible();
  await expect(page.getByText("Encrypted drive: keep the enclosure’s small board and the drive together.").first()).toBeVisible();
  const chip = page.url();
  await page.goto(`${chip}/decision`);
  await expect(page.getByText("U12 belongs together with U14: both are transferred. Now U14: To read.")).toBeVisible();
  await expect(page.getByText("U14 is not read yet.")).toBeVisible();
});

test("a board whose data lies inside the controller ends with an explanation", async ({ browser }) => {
  const { page } = await signIn(browser, "mira");
  await newCase(page, "Nothing To Move");
  const dialog = page.getByRole("dialog");
  await page.getByRole("button", { name: "Add a drive…" }).click();
  await dialog.getByLabel("Part number").fill("PN 9001-0002-A");
  await page.keyboard.press("Enter");
  await dialog.getByLabel("Board number").fill("BX 51-0001");
  await dialog.getByLabel("Its unique data lies inside the main controller").check();
  await expect(dialog.getByText("The transfer is not applicable to this drive.")).toBeVisible();
  await page.keyboard.press("Enter");
  await expect(dialog).toBeHidden();
  await expect(page.getByText("There is no chip to move: this board’s own data lies inside the main controller.")).toBeVisible();
  await expect(page.getByRole("button", { name: "Add a donor board…" })).toHaveCount(0);
  await page.getByRole("button", { name: "Add a chip…" }).click();
  await expect(dialog.getByLabel("This chip needs a transfer", { exact: false })).not.toBeChecked();
});
