import { execFileSync } from "node:child_process";
import path from "node:path";
import { expect, type Page } from "@playwright/test";
import { approve, type Pair, randomImage, sha256Of, store } from "./support/bench";
import { openDesk, signIn } from "./support/desk";
import { sendSummary, summaryLink } from "./support/end-steps";
import { newFolder } from "./support/files";
import { mailsTo } from "./support/mails";
import { done, tokenOf } from "./support/station";
import { test } from "./support/test";

const EMAIL = "keys@hollowaychandlers.example";
const SIZE = 65_536;

interface Prepared {
  caseId: string;
  driveId: string;
}

/** Two chips of one drive: U12 was written and read back, U3 was moved and read back. */
async function prepare(): Promise<Prepared> {
  const [mira, ines] = [await tokenOf("mira"), await tokenOf("ines")];
  const post = <T>(to: string, json: object) => done<T>("POST", to, { token: mira, json });
  const { id: caseId } = await post<{ id: string }>("/api/cases", { customer: { name: "Holloway Chandlers", email: EMAIL }, damage: "Wet; the board smelt burnt" });
  const { id: driveId } = await post<{ id: string }>(`/api/cases/${caseId}/drives`, { partNumber: "PN 6203-0018-D", model: "M2 4 TB", serial: "QF-2207-51" });
  const board = { boardNumber: "BX 47-5520", revision: "rev B" };
  const { id: boardId } = await post<{ id: string }>(`/api/drives/${driveId}/boards`, { role: "original", ...board });
  const { id: donorBoardId } = await post<{ id: string }>(`/api/drives/${driveId}/boards`, { role: "donor", ...board });
  for (const [designator, kind] of [["U12", "write"], ["U3", "chip-moved"]] as const) {
    const facts = { designator, bus: "spi", sizeBytes: SIZE, sizeSource: "marking", supplyMillivolts: 3300, holds: "Drive settings" };
    const { id: chipId } = await post<{ id: string }>(`/api/boards/${boardId}/chips`, facts);
    const { id: donorChipId } = await post<{ id: string }>(`/api/boards/${donorBoardId}/chips`, { ...facts, pairedWith: chipId });
    const pair: Pair = { caseId, driveId, boardId, chipId, donorBoardId, donorChipId };
    const [own, image] = [randomImage(SIZE), randomImage(SIZE)];
    await store(mira, donorChipId, "donor", 1, [own, own]);
    await store(mira, chipId, "before", 1, [image, image]);
    await store(mira, chipId, "before", 2, [image]);
    const given = await approve(ines, pair, sha256Of(image));
    expect(given.status).toBe(201);
    await post(`/api/approvals/${given.json<{ id: string }>().id}/transfer`, { kind, donorChipId, ...(kind === "write" ? { programmer: "R2", toolVersion: "1.4.2", adapter: "SOIC-8 clip C4" } : {}) });
    for (const seating of [1, 2]) await store(mira, donorChipId, "after", seating, [image]);
  }
  return { caseId, driveId };
}

/** Pictures to look at, where a folder for them is named. */
async function look(page: Page, name: string): Promise<void> {
  const folder = process.env.CLOSING_PICTURES;
  if (!folder) return;
  for (const scheme of ["light", "dark"] as const) {
    await page.emulateMedia({ colorScheme: scheme });
    for (const width of [1440, 390]) {
      await page.setViewportSize({ width, height: 1000 });
      await page.screenshot({ path: path.join(folder, `${name}-${width}-${scheme}.png`), fullPage: true });
    }
  }
  await page.emulateMedia({ colorScheme: "light" });
  await page.setViewportSize({ width: 1440, height: 1000 });
}

test("a verified drive is tested, sent back and closed; its case then takes no change until it is opened again", async ({ browser }) => {
  test.setTimeout(240_000);
  const { caseId, driveId } = await prepare();
  const mira = await signIn(browser, "mira");
  const { page } = mira;

  await test.step("mira tests the start-up: a wrong serial first, then the drive's own", async () => {
    await page.goto(`/cases/${caseId}`);
    await page.getByRole("link", { name: /^Test it/ }).click();
    await expect(page.getByRole("heading", { level: 2, name: "Start-up test" })).toBeVisible();
    for (const serial of ["QF-2207-57", "qf 2207 51"]) {
      await page.getByRole("button", { name: "Record a start-up test…" }).click();
      const dialog = page.getByRole("dialog", { name: "Record the start-up test" });
      await dialog.getByRole("radio", { name: "It spins" }).check();
      await dialog.getByRole("radio", { name: "It gets ready" }).check();
      await dialog.getByLabel("Serial that the drive reports").fill(serial);
      if (serial === "QF-2207-57") {
        await expect(dialog.getByText("Stop: the drive reports another drive’s serial.")).toBeVisible();
        await look(page, "start-up-dialog");
      }
      await dialog.getByRole("button", { name: "Record the test" }).click();
      await expect(dialog).toBeHidden();
      if (serial === "QF-2207-57") {
        await expect(page.getByText("Stop: the drive reports another drive’s serial.")).toBeVisible();
        await look(page, "drive-stop");
      }
    }
    await expect(page.getByText("Spins, gets ready and reports the serial of its label; 1 attempt")).toBeVisible();
    await expect(page.getByText("Stop: the drive reports another drive’s serial.")).toBeHidden();
  });

  await test.step("mira records the return, and the customer hears of it", async () => {
    await page.goto(`/cases/${caseId}`);
    await look(page, "case-verified");
    await page.getByRole("button", { name: "Record the return…" }).click();
    const dialog = page.getByRole("dialog", { name: "Record the return" });
    await expect(dialog.getByRole("checkbox", { name: "Original board, BX 47-5520 rev B, without U3" })).toBeChecked();
    await dialog.getByLabel("And also").fill("USB cable");
    await dialog.getByLabel("Carrier").fill("Hill Parcels");
    await dialog.getByLabel("Tracking number").fill("HP 4471");
    await look(page, "return-dialog");
    await dialog.getByRole("button", { name: "Record the return" }).click();
    await expect(dialog).toBeHidden();
    await expect(page.getByRole("heading", { level: 2, name: "Returned" })).toBeVisible();
    await expect.poll(() => mailsTo(EMAIL).join("\n"), { timeout: 30_000 }).toContain("Tracking number: HP 4471");
  });

  const ines = await signIn(browser, "ines");
  await test.step("ines sends the summary and closes the case", async () => {
    await ines.page.goto(`/cases/${caseId}`);
    await sendSummary(ines.page);
    await ines.page.getByRole("button", { name: "Close the case…" }).click();
    const dialog = ines.page.getByRole("dialog", { name: /^Release and close case/ });
    await look(ines.page, "close-dialog");
    await dialog.getByRole("button", { name: "Close the case" }).click();
    await expect(dialog).toBeHidden();
    await expect(ines.page.getByRole("heading", { level: 2, name: "Returned and closed" })).toBeVisible();
    await expect(ines.page.getByText("Images due for erasure on")).toBeVisible();
    await look(ines.page, "case-closed");
    await ines.page.goto("/cases?q=Holloway");
    await expect(ines.page.getByText(/Images due for erasure on/)).toBeVisible();
  });

  await test.step("the closed case takes no test", async () => {
    const refused = await page.request.post(`/api/drives/${driveId}/start-up-test`, { data: { spins: true, ready: true, attempts: 1 }, headers: { origin: new URL(page.url()).origin } });
    expect(refused.status()).toBe(409);
    expect(((await refused.json()) as { detail: string }).detail).toContain("is closed. Reopen it first");
    await page.goto(`/drives/${driveId}`);
    await expect(page.getByText("The case is closed. A lead reopens it first.")).toBeVisible();
    await look(page, "drive-closed");
  });

  await test.step("the customer reads what was done, and keeps it as one page", async () => {
    const customer = await openDesk(browser);
    await customer.page.goto(await summaryLink(EMAIL));
    const main = customer.page.getByRole("main");
    for (const said of ["U3 was taken off it and is on the donor board now.", "(with R2, 1.4.2, SOIC-8 clip C4)", "it spins, gets ready and reports the serial of its label", "What comes back to you", "USB cable"]) await expect(main).toContainText(said);
    await look(customer.page, "summary");
    const folder = newFolder();
    const printed = path.join(folder, "printed.pdf");
    await customer.page.pdf({ path: printed, preferCSSPageSize: true });
    const saving = customer.page.waitForEvent("download");
    await customer.page.getByRole("link", { name: "Download as PDF" }).click();
    const saved = path.join(folder, "summary.pdf");
    await (await saving).saveAs(saved);
    for (const file of [printed, saved]) {
      expect(execFileSync("pdfinfo", [file], { encoding: "utf8" }), file).toMatch(/Pages:\s+1\n/);
      if (process.env.CLOSING_PICTURES) execFileSync("pdftoppm", ["-r", "80", "-png", file, path.join(process.env.CLOSING_PICTURES, path.basename(file, ".pdf"))]);
    }
  });

  await test.step("ines opens it again", async () => {
    await ines.page.goto(`/cases/${caseId}`);
    await ines.page.getByRole("button", { name: "Reopen the case…" }).click();
    const dialog = ines.page.getByRole("dialog", { name: /^Reopen case/ });
    await dialog.getByLabel("Reason").fill("The customer sent it back.");
    await dialog.getByRole("button", { name: "Reopen the case" }).click();
    await expect(dialog).toBeHidden();
    await expect(ines.page.getByText("Images due for erasure on")).toBeHidden();
  });
});
