import { randomBytes } from "node:crypto";
import { writeFileSync } from "node:fs";
import path from "node:path";
import { expect } from "@playwright/test";
import { fromImage } from "@/lib/core/text-format";
import { likeFirmware } from "../support/firmware";
import { makePair } from "./support/api";
import { signIn } from "./support/desk";
import { newFolder } from "./support/files";
import { test } from "./support/test";

const SIZE = 8 * 1024 * 1024;

test("a large text of records is looked into beside the page, waits for its format, and gives its addresses", async ({ browser }) => {
  const desk = await signIn(browser, "tomas");
  const { page } = desk;
  const file = path.join(newFolder(), "image.hex");
  writeFileSync(file, fromImage("intel-hex", likeFirmware(new Uint8Array(randomBytes(SIZE)))));
  const chip = await makePair(page, { customer: "Odd reads: a text", sizeBytes: SIZE });
  await page.goto(`/chips/${chip.chipId}`);
  const thread = page.waitForEvent("worker");
  const chooser = page.waitForEvent("filechooser");
  await page.getByRole("button", { name: "Choose files" }).click();
  await (await chooser).setFiles([file]);
  await thread;
  await expect(page.getByText("Looks like Intel HEX text: its name ends in .hex and its first line begins with a colon.", { exact: false })).toBeVisible();
  await expect(page.getByText("Looking into")).toHaveCount(0);
  await page.getByLabel("Format of the files").selectOption("intel-hex");
  await expect(page.getByText("0x0000 to 0x7FFFFF", { exact: false }).first()).toBeVisible();
  await desk.context.close();
});
