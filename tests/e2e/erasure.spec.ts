import { execFileSync } from "node:child_process";
import { createHash, randomBytes } from "node:crypto";
import { existsSync, writeFileSync } from "node:fs";
import path from "node:path";
import { expect, type Page } from "@playwright/test";
import sharp from "sharp";
import { withCheck } from "@/lib/core/case-number";
import { dataFolder } from "./support/accounts";
import { expectAccessible } from "./support/axe";
import { randomImage, sha256Of, store } from "./support/bench";
import { asAdmin } from "./support/database";
import { openDesk, signIn } from "./support/desk";
import { newFolder } from "./support/files";
import { mailsTo } from "./support/mails";
import { putRequest } from "./support/requested";
import { call, done, tokenOf } from "./support/station";
import { expectTrouble, test } from "./support/test";

const pictures = process.env.ERASURE_PICTURES;
const SENDER = "sender@parcels.example";

/** Nothing axe finds, nothing wider than the window; pictures where a folder for them is named. */
async function look(page: Page, name: string): Promise<void> {
  for (const [width, scheme] of [[1440, "light"], [390, "dark"]] as const) {
    await page.setViewportSize({ width, height: 1000 });
    await page.emulateMedia({ colorScheme: scheme });
    expect(await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth), `${name} at ${width}`).toBeLessThanOrEqual(0);
    await expectAccessible(page, `${name}, ${width} px, ${scheme}`, { theme: scheme });
    if (pictures) await page.screenshot({ path: path.join(pictures, `${name}-${width}-${scheme}.png`), fullPage: !name.endsWith("dialog") });
  }
  await page.setViewportSize({ width: 1440, height: 1000 });
  await page.emulateMedia({ colorScheme: "light" });
}

interface Prepared {
  caseId: string;
  ref: string;
  chipId: string;
  link: string;
  image: Uint8Array<ArrayBuffer>;
}

/** A requested case with reads and a photo, closed without a transfer; its customer has the private link. */
async function prepare(): Promise<Prepared> {
  const { caseId, ref } = await putRequest({ name: "Marl & Teasel Archive", answers: { name: "Marl & Teasel Archive", email: SENDER, happened: "The lamp went out.", damage: "power-surge", keepDays: "90", returnAddress: "4 Reed Bank" } });
  const secret = randomBytes(32).toString("base64url");
  await asAdmin((db) => db.query("UPDATE requests SET token_hash = ? WHERE case_id = ?", [createHash("sha256").update(secret).digest(), caseId]));
  const [mira, ines] = [await tokenOf("mira"), await tokenOf("ines")];
  const post = <T>(to: string, json: object) => done<T>("POST", to, { token: mira, json });
  await post(`/api/cases/${caseId}/receipt`, { sealAsSent: "none", smallBoard: "yes", parcelCondition: "Dry, nothing broken" });
  const { id: driveId } = await post<{ id: string }>(`/api/cases/${caseId}/drives`, { partNumber: "PN 5580-0031-A", serial: "MT-5580-11" });
  const { id: boardId } = await post<{ id: string }>(`/api/drives/${driveId}/boards`, { role: "original", boardNumber: "BX 55-8003", revision: "rev A" });
  const { id: chipId } = await post<{ id: string }>(`/api/boards/${boardId}/chips`, { designator: "U4", bus: "spi", sizeBytes: 65_536, sizeSource: "marking", supplyMillivolts: 3300 });
  const image = randomImage(65_536);
  await store(mira, chipId, "before", 1, [image, image]);
  const photo = new FormData();
  photo.append("file", new Blob([new Uint8Array(await sharp({ create: { width: 640, height: 480, channels: 3, background: "#2f5d50" } }).jpeg().toBuffer())], { type: "image/jpeg" }), "board.jpg");
  expect((await call("POST", `/api/boards/${boardId}/photos`, { token: mira, body: photo })).status).toBe(201);
  expect((await call("POST", `/api/cases/${caseId}/closing`, { token: ines, json: { kind: "without-transfer", reason: "The board is burnt through; it went back by hand." } })).status).toBe(200);
  return { caseId, ref, chipId, link: `/request/${secret}`, image };
}

test("a customer asks for deletion, a lead answers, erases later, and the certificate, the mail and every page say so", async ({ browser }) => {
  test.setTimeout(300_000);
  const { caseId, ref, chipId, link, image } = await prepare();
  const file = path.join(dataFolder(), "images/sha256", sha256Of(image).slice(0, 2), sha256Of(image));
  const { page } = await signIn(browser, "ines");

  await test.step("before the day and without a wish nobody can erase", async () => {
    await page.goto(`/cases/${caseId}#images`);
    await expect(page.getByRole("button", { name: "Erase the images…" })).toBeDisabled();
    await expect(page.getByText(/are due for erasure on .*Before that day only the customer’s own wish lets them go/)).toBeVisible();
  });

  const customer = await openDesk(browser);
  await test.step("the customer asks on the private page", async () => {
    await customer.page.goto(link);
    await customer.page.getByRole("button", { name: "Ask for deletion…" }).click();
    await customer.page.getByLabel("Message").fill("All of it, please.");
    await customer.page.getByRole("dialog").getByRole("button", { name: "Ask for deletion" }).click();
    await expect(customer.page.getByText(/^You asked for deletion on/)).toBeVisible();
  });

  await test.step("the bench says that a customer waits, and the lead answers why not yet", async () => {
    await page.goto("/bench");
    await expect(page.getByText(/customers? asks? for deletion\./)).toBeVisible();
    if (pictures) await look(page, "bench");
    await page.getByRole("link", { name: ref, exact: true }).first().click();
    await expect(page.getByText(/A lead answers by .*: \d+ days left\./)).toBeVisible();
    await look(page, "wish");
    await page.getByRole("button", { name: "Answer why not yet…" }).click();
    const dialog = page.getByRole("dialog", { name: "Answer why not yet" });
    await look(page, "answer-dialog");
    await dialog.getByLabel("Answer").fill("The insurer still asks what was read. We keep the images until that is settled.");
    await dialog.getByRole("button", { name: "Send the answer" }).click();
    await expect(dialog).toBeHidden();
    await expect(page.getByText(/answered on .*The insurer still asks/)).toBeVisible();
    await expect.poll(() => mailsTo(SENDER).join("\n"), { timeout: 30_000 }).toContain("The insurer still asks what was read.");
    await customer.page.reload();
    await expect(customer.page.getByText("The insurer still asks what was read.")).toBeVisible();
    await look(customer.page, "customer-answered");
  });

  await test.step("kept longer, nobody can erase, until the keeping is ended", async () => {
    await page.getByRole("button", { name: "Keep longer…" }).click();
    const dialog = page.getByRole("dialog", { name: /^Keep the images of case/ });
    await dialog.getByLabel("Until").fill("2099-01-01");
    await dialog.getByLabel("Reason").fill("The insurer’s question is open.");
    await dialog.getByRole("button", { name: "Keep them longer" }).click();
    await expect(dialog).toBeHidden();
    await expect(page.getByText("until Thu 1 Jan 2099")).toBeVisible();
    await expect(page.getByRole("button", { name: "Erase the images…" })).toBeDisabled();
    await look(page, "kept-longer");
    await page.getByRole("button", { name: "End the keeping…" }).click();
    await page.getByRole("dialog").getByLabel("Reason").fill("Settled.");
    await page.getByRole("dialog").getByRole("button", { name: "End the keeping" }).click();
    await expect(page.getByText("until Thu 1 Jan 2099")).toBeHidden();
  });

  await test.step("the lead types the number and a reason, and the bytes are gone", async () => {
    expect(existsSync(file)).toBe(true);
    await page.getByRole("button", { name: "Erase the images…" }).click();
    const dialog = page.getByRole("dialog", { name: `Erase the images of case ${ref}` });
    await expect(dialog.getByText("This can’t be undone.")).toBeVisible();
    await expect(dialog.getByText(/^U4 was never verified/)).toBeVisible();
    await look(page, "erase-dialog");
    await dialog.getByLabel("Case number").fill("26-9999");
    await dialog.getByLabel("Reason").fill("The customer asked; the insurer has settled.");
    expectTrouble(/^422 POST \/api\/cases\/[\w-]+\/erasure$/);
    await dialog.getByRole("button", { name: "Erase the images" }).click();
    await expect(dialog.getByText(new RegExp(`this is case ${ref}`))).toBeVisible();
    expect(existsSync(file)).toBe(true);
    await dialog.getByLabel("Case number").fill(withCheck(ref));
    await dialog.getByRole("button", { name: "Erase the images" }).click();
    await expect(dialog).toBeHidden();
    await expect(page.getByText(/because the customer asked for it: 1 image and 1 photo or document/)).toBeVisible();
    expect(existsSync(file)).toBe(false);
    await look(page, "erased-case");
  });

  await test.step("chip, gallery, audit and the customer's page say so", async () => {
    await page.goto(`/chips/${chipId}`);
    await expect(page.getByText(/^This image was erased on .* at the customer’s wish; its SHA-256 stays in the log\.$/).first()).toBeVisible();
    await look(page, "erased-chip");
    const drive = await done<{ drives: { id: string }[] }>("GET", `/api/cases/${caseId}`, { token: await tokenOf("mira") });
    await page.goto(`/drives/${drive.drives[0].id}`);
    await expect(page.getByText("Erased", { exact: true }).first()).toBeVisible();
    await look(page, "erased-drive");
    await page.goto("/audit/images?what=erased");
    await expect(page.getByText(/^Erased on/).first()).toBeVisible();
    await look(page, "erased-audit");
    await page.goto("/cases?state=erasure-due");
    await expect(page.getByText(ref)).toHaveCount(0);
    await customer.page.reload();
    await expect(customer.page.getByText(/^We erased the images on/)).toBeVisible();
    await look(customer.page, "customer-erased");
    await expect.poll(() => mailsTo(SENDER).join("\n"), { timeout: 30_000 }).toContain("1 image of chips, 1 photo or document");
  });

  await test.step("the certificate names each image and leaves room for the backups", async () => {
    await page.goto(`/cases/${caseId}/print/erasure`);
    const sheet = page.getByRole("region", { name: "Certificate of erasure" });
    await expect(sheet).toContainText(sha256Of(image));
    await expect(sheet).toContainText("Backups of the workshop, until they run out.");
    await look(page, "certificate");
    const pdf = path.join(newFolder(), "certificate.pdf");
    writeFileSync(pdf, await page.pdf({ preferCSSPageSize: true, printBackground: true }));
    expect(execFileSync("pdfinfo", [pdf], { encoding: "utf8" })).toMatch(/Pages:\s+1\n/);
    if (pictures) execFileSync("pdftoppm", ["-r", "80", "-png", pdf, path.join(pictures, "certificate-paper")]);
  });
});
