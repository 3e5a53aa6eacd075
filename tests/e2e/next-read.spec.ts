import { expect } from "@playwright/test";
import { randomImage, store } from "./support/bench";
import { signIn } from "./support/desk";
import { done, tokenOf } from "./support/station";
import { test } from "./support/test";

const SIZE = 8192;

/** Three equal reads in two seatings, and no donor yet. */
async function readOriginal(): Promise<{ chipId: string }> {
  const token = await tokenOf("tomas");
  const post = <T>(to: string, json: object) => done<T>("POST", to, { token, json });
  const { id: caseId } = await post<{ id: string }>("/api/cases", { customer: { name: "Reed Lane Printers", email: "press@reedlane.example" }, damage: "Power surge" });
  const { id: driveId } = await post<{ id: string }>(`/api/cases/${caseId}/drives`, { partNumber: "PN 9100-0007-B" });
  const { id: boardId } = await post<{ id: string }>(`/api/drives/${driveId}/boards`, { role: "original", boardNumber: "BX 91-0007" });
  const { id: chipId } = await post<{ id: string }>(`/api/boards/${boardId}/chips`, { designator: "U7", bus: "spi", sizeBytes: SIZE, sizeSource: "marking", supplyMillivolts: 3300 });
  const image = randomImage(SIZE);
  await store(token, chipId, "before", 1, [image, image]);
  await store(token, chipId, "before", 2, [image]);
  return { chipId };
}

test("a donor recorded between two visits of the chip page is what is read next, and its content is not filed as the original's", async ({ browser }) => {
  const { chipId } = await readOriginal();
  const { page } = await signIn(browser, "mira");
  await page.goto(`/chips/${chipId}`);
  const content = page.getByLabel("Which content is it?").locator("option:checked");
  await expect(content).toHaveText("Original U7");
  await expect(page.getByText("Record the donor’s chip that is to take the image and save what it holds, then ask a lead who took none of them to approve.")).toBeVisible();
  // from page to page without loading anew, as somebody does who follows the buttons
  await page.getByRole("link", { name: "Record the donor’s chip" }).click();
  await page.getByRole("button", { name: "Add a donor board…" }).click();
  const dialog = page.getByRole("dialog");
  await dialog.getByLabel("Board number").fill("BX 91-0007");
  await dialog.getByRole("button", { name: "Save and go on with its chip" }).click();
  await dialog.getByLabel("Supply").selectOption("3300");
  await dialog.getByRole("button", { name: "Add the chip" }).click();
  await expect(dialog).toBeHidden();
  await page.getByRole("link", { name: "Open U7", exact: true }).first().click();
  await expect(page.getByRole("heading", { level: 1, name: "U7" })).toBeVisible();
  await expect(content).toHaveText("Donor U7’s own content");
  await page.getByLabel("Which content is it?").selectOption("before");
  await page.getByRole("button", { name: "Save the donor’s content" }).click();
  await expect(content).toHaveText("Donor U7’s own content");
  await expect(page.getByLabel("Which content is it?")).toBeFocused();
});
