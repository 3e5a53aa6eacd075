import { expect, type Page } from "@playwright/test";
import { makePair, store } from "./support/bench";
import { signIn } from "./support/desk";
import { tokenOf } from "./support/station";
import { test } from "./support/test";

const MIB = 1024 * 1024;
/** without folds its lines are more px than a browser lays out */
const SIZE = 16 * MIB;
const TEXT = "BOOT BLOCK";
const TEXT_AT = 0x9a_bcd0;
const FLIPPED = [0x000123, 0x5f_fff0, 0xff_ffff];

function images(): Uint8Array<ArrayBuffer>[] {
  const image = new Uint8Array(SIZE);
  for (let at = 0; at < SIZE; at += 1) image[at] = (at * 31 + (at >> 8) * 7) & 0x7f;
  // sixteen bits a character, as some firmware writes its words
  for (let i = 0; i < TEXT.length; i += 1) image.set([TEXT.charCodeAt(i), 0], TEXT_AT + i * 2);
  const other = image.slice();
  for (const at of FLIPPED) other[at] ^= 0x80;
  return [image, other];
}

const box = (page: Page) => page.getByRole("region", { name: "Bytes of Read 1 and Read 2" });
const line = (page: Page, address: string) => box(page).getByRole("row").filter({ has: page.getByRole("rowheader", { name: new RegExp(`^${address}`) }) });
const pairs = (bytes: Uint8Array) => Array.from(bytes, (byte) => byte.toString(16).toUpperCase().padStart(2, "0")).join(" ");

test("of 16 MiB every byte is reached by key, pointer, address, difference and content, and none is shown in a wrong place", async ({ browser }) => {
  test.setTimeout(120_000);
  const token = await tokenOf("mira");
  const chip = await makePair(token, { customer: "Compare: large images", sizeBytes: SIZE });
  const [image, other] = images();
  await store(token, chip.chipId, "before", 1, [image, other]);
  const { page, context } = await signIn(browser, "mira");
  // the whole box, so that what is in it is in the window
  await page.setViewportSize({ width: 1440, height: 1500 });
  await context.grantPermissions(["clipboard-read", "clipboard-write"]);
  const holds = async (address: number) => {
    const from = address - (address % 16);
    const row = line(page, `0x${from.toString(16).toUpperCase().padStart(6, "0")}`);
    await expect(row).toBeInViewport();
    for (const [side, bytes] of [image, other].entries()) await expect(row.getByRole("cell").nth(side)).toHaveText(new RegExp(pairs(bytes.subarray(from, from + 16)).replaceAll(" ", "\\s+")));
  };

  await test.step("a link to an address opens there; N and P go by difference, round the end", async () => {
    await page.goto(`/chips/${chip.chipId}/compare?reads=1,2&at=0x9ABCD0`);
    await holds(TEXT_AT);
    for (const [key, at] of [["n", FLIPPED[2]], ["n", FLIPPED[0]], ["p", FLIPPED[2]], ["p", FLIPPED[1]]] as const) {
      await page.keyboard.press(key);
      await holds(at);
    }
    expect(page.url()).toContain("at=0x5FFFF0");
    await expect(page.getByText("2 of 3")).toBeVisible();
  });

  await test.step("a fold opens where it stood, and whoever opened it is still in the box", async () => {
    await box(page).getByRole("button", { name: /^6,291,1\d\d bytes equal/ }).press("Enter");
    await expect(box(page)).toBeFocused();
    await holds(FLIPPED[1]);
    await expect(line(page, "0x5FFFD0")).toBeInViewport();
  });

  await test.step("without folds: Home, End, pages and the scale", async () => {
    await page.getByLabel("Fold lines that agree").uncheck();
    await box(page).focus();
    await page.keyboard.press("End");
    await holds(SIZE - 1);
    await page.keyboard.press("Home");
    await holds(0);
    await page.keyboard.press("PageDown");
    await expect(line(page, "0x000000")).not.toBeInViewport();
    const scale = page.locator(".hex-scale");
    const { x, y, width, height } = (await scale.boundingBox())!;
    await page.mouse.move(x + width / 2, y + 4);
    await page.mouse.down();
    await page.mouse.move(x + width / 2, y + height / 2, { steps: 3 });
    await expect(scale.locator("b")).toHaveText(/^0x[78][0-9A-F]{5}$/);
    const reached = Number(await scale.locator("b").textContent());
    await page.mouse.up();
    await holds(reached);
    // on over the border of two parts: what comes then is what comes next
    const parts = await box(page).evaluate((element) => {
      const places: number[] = [];
      for (let i = 0; i < 3; i += 1) {
        element.scrollTop = element.scrollHeight;
        places.push(element.scrollTop);
      }
      return places;
    });
    expect(parts[0]).toBeGreaterThan(1_000_000);
    const first = Number(/^0x[0-9A-F]{6}/.exec(await box(page).getByRole("rowheader").nth(20).innerText())![0]);
    expect(first).toBeGreaterThan(reached);
    await holds(first);
  });

  await test.step("an address past the end and half a byte are told what is right; the field keeps the focus", async () => {
    const field = page.getByLabel("Go to");
    await field.fill("0x1000000");
    await field.press("Enter");
    await expect(page.getByText("The last address is 0xFFFFFF.")).toBeVisible();
    await field.fill("0x5FFFF3");
    await field.press("Enter");
    await expect(field).toBeFocused();
    await holds(0x5ffff3);
    await page.getByLabel("Find", { exact: true }).fill("5A A");
    await page.getByLabel("Find", { exact: true }).press("Enter");
    await expect(page.getByText("Type bytes as pairs of hex digits, such as 5A A5, or choose text.")).toBeVisible();
  });

  await test.step("text is found although it is written wide, bytes although they lie behind the end, and nothing where nothing is", async () => {
    await page.getByLabel("Written as").selectOption("text");
    await page.getByLabel("Find", { exact: true }).fill(TEXT);
    await page.getByRole("button", { name: "Find next" }).click();
    await expect(page.getByText("Read 1 and Read 2 hold it at 0x9ABCD0, two bytes a character.")).toBeVisible();
    await holds(TEXT_AT);
    await expect(line(page, "0x9ABCD0").locator(".hex-found")).toHaveText(pairs(image.subarray(TEXT_AT, TEXT_AT + 16)).replace(/^((?:.{3}){8})/, "$1 "));
    await page.getByLabel("Written as").selectOption("bytes");
    await page.getByLabel("Find", { exact: true }).fill(pairs(other.subarray(FLIPPED[0] - 3, FLIPPED[0] + 1)));
    await page.getByRole("button", { name: "Find next" }).click();
    await expect(page.getByText("Read 2 holds it at 0x000120. From the start again.")).toBeVisible();
    await holds(FLIPPED[0]);
    await page.getByLabel("In which read").selectOption({ label: "in Read 1" });
    await page.getByRole("button", { name: "Find previous" }).click();
    await expect(page.getByText("Read 1 doesn’t hold it anywhere.")).toBeVisible();
  });

  await test.step("a difference is copied as hex", async () => {
    await page.getByRole("button", { name: /^Next difference/ }).click();
    await page.getByLabel("Read to copy from").selectOption({ label: "Read 2" });
    await page.getByLabel("Last address to copy").fill("0x000130");
    await page.getByRole("button", { name: "Copy as hex" }).click();
    await expect(page.getByText("14 bytes copied.")).toBeVisible();
    expect(await page.evaluate(() => navigator.clipboard.readText())).toBe(pairs(other.subarray(0x123, 0x131)));
  });
});
