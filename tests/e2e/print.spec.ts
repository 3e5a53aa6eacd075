import { mkdtempSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { expect, type Page } from "@playwright/test";
import { withCheck } from "@/lib/core/case-number";
import { LABEL_SIZES, type PaperName } from "@/lib/core/paper";
import { chipOf, makeReady, type Ready } from "./support/bench";
import { type Desk, signIn } from "./support/desk";
import { printed, scanned, stickingOut } from "./support/paper";
import { call, done, tokenOf } from "./support/station";
import { test } from "./support/test";

const folder = mkdtempSync(path.join(tmpdir(), "printed-"));
const long = (word: string, length: number) => Array.from({ length }, (_, i) => word[i % word.length]).join("");
/** The longest that the forms take, without a place to break. */
const LONG = { partNumber: long("PN4471-0093-B-", 120), serial: long("9KQ370B8D2", 120), boardNumber: long("BX40-3179-", 120), revision: long("REVC", 60) };

let mira: string;
let ines: string;
let ready: Ready;
let ref: string;
let longCase: string;
let desk: Desk;

async function makeLong(): Promise<string> {
  const post = <T>(address: string, json: object) => done<T>("POST", address, { token: mira, json });
  const text = `${long("Water ran over it. ", 1900)}\n${long("nobreaks", 1900)}`;
  const made = await post<{ id: string }>("/api/cases", { customer: { name: long("Longname", 200), email: "long@printed.example", contact: long("Contact", 200) }, damage: text, note: text });
  for (let n = 0; n < 3; n += 1) {
    const drive = await post<{ id: string }>(`/api/cases/${made.id}/drives`, { partNumber: LONG.partNumber, serial: `${n}${LONG.serial.slice(1)}`, model: long("MODEL", 120) });
    const board = await post<{ id: string }>(`/api/drives/${drive.id}/boards`, { role: "original", boardNumber: LONG.boardNumber, revision: LONG.revision });
    for (const designator of ["U3", "U12"]) await post(`/api/boards/${board.id}/chips`, { designator, bus: "spi", sizeBytes: 67_108_864, supplyMillivolts: 1800, package: "SOIC-16", marking: long("25Q64-", 120), holds: long("adaptives ", 100) });
  }
  await post(`/api/cases/${made.id}/receipt`, {
    sealAsSent: "no", sealNumber: long("S-", 80), smallBoard: "no", carrier: long("Carrier", 120), tracking: long("TR77", 120), parcelCondition: long("crushed ", 2000), accessories: long("cable,", 1000),
    lines: Array.from({ length: 6 }, (_, i) => ({ what: `Line ${i}`, asSent: "no", text: long("other", 140) })),
  });
  return made.id;
}

test.beforeAll(async ({ browser }) => {
  test.setTimeout(120_000);
  [mira, ines] = await Promise.all([tokenOf("mira"), tokenOf("ines")]);
  ready = await makeReady(mira, { customer: "Lindmoor Veterinary Practice" });
  ref = (await done<{ ref: string }>("GET", `/api/cases/${ready.caseId}`, { token: mira })).ref;
  longCase = await makeLong();
  desk = await signIn(browser, "mira");
});
test.afterAll(() => desk.context.close());

const open = async (page: Page, caseId: string, what: string) => {
  await page.goto(`/cases/${caseId}/print/${what}`);
  await expect(page.locator(".printed").first()).toBeVisible();
};

for (const size of LABEL_SIZES) {
  test(`labels of ${size} mm: one to a page, told apart by shape, their codes read back`, async () => {
    const { page } = desk;
    await open(page, ready.caseId, `labels?size=${size}`);
    const shapes = await page.locator("[data-kind]").evaluateAll((plates) => plates.map((plate) => plate.querySelector("svg")!.innerHTML.replace(/(fill|stroke)="[^"]*"/g, "")));
    expect(new Set(shapes).size, "without any colour").toBe(4);
    const { pictures, text } = await printed(page, size, folder, `labels-${size}`, 5);
    for (const picture of pictures) expect(scanned(picture)).toBe(withCheck(ref));
    for (const word of ["Drive A", "Original board", "Donor board", "U7", "3.3 V", "PN 9100-0002-B", "BX 91-0002 rev A"]) expect(text).toContain(word);
    expect(text).not.toContain("Lindmoor");
    expect(await stickingOut(page)).toEqual([]);
    await open(page, longCase, `labels?size=${size}`);
    expect(await stickingOut(page)).toEqual([]);
    const longest = await printed(page, size, folder, `labels-long-${size}`, 12);
    for (const picture of longest.pictures) expect(scanned(picture)).toMatch(/^\d\d-\d{4,}\.[0-9A-Z]$/);
  });
}

const PAPERS: { what: string; paper: PaperName; pages: number; longPages: number; words: string[] }[] = [
  { what: "job-ticket", paper: "a5", pages: 1, longPages: 3, words: ["Job ticket", "Never write to the original chip.", "U7"] },
  { what: "read-sheet", paper: "a4", pages: 2, longPages: 6, words: ["Read sheet, U7 of the original", "Read sheet, U7 of the donor", "CRC-32"] },
  { what: "return-slip", paper: "a4", pages: 1, longPages: 2, words: ["Return slip", "Original board of Drive A", "signature"] },
  { what: "receipt", paper: "a5", pages: 1, longPages: 2, words: ["Receipt", "Handed over by"] },
];
for (const { what, paper, pages, longPages, words } of PAPERS) {
  test(`${what} on ${paper}: its pages, its words, its code, and long values stay inside`, async () => {
    const { page } = desk;
    await open(page, ready.caseId, what);
    expect(await stickingOut(page)).toEqual([]);
    const { pictures, text } = await printed(page, paper, folder, what, pages);
    for (const picture of pictures) expect(scanned(picture)).toBe(withCheck(ref));
    for (const word of words) expect(text).toContain(word);
    await open(page, longCase, what);
    expect(await stickingOut(page)).toEqual([]);
    const longest = await printed(page, paper, folder, `${what}-long`);
    expect(longest.pages).toBeLessThanOrEqual(longPages);
  });
}

test("a write ticket is refused before an approval, printed while it stands, and void once it is revoked", async () => {
  const { page } = desk;
  const address = `/cases/${ready.caseId}/print/write-ticket?of=${ready.chipId}`;
  await page.goto(address);
  await expect(page.getByRole("main")).toContainText("No image of this chip is approved");
  await expect(page.getByRole("button", { name: "Print", exact: true })).toHaveCount(0);
  // the fullest ticket: a second chip that moves too, an encrypted drive, and all that a lead may write
  await done("POST", `/api/boards/${ready.boardId}/chips`, { token: mira, json: { designator: "U12", bus: "spi", sizeBytes: 65_536, supplyMillivolts: 3300, holds: "adaptives" } });
  await done("PATCH", `/api/drives/${ready.driveId}`, { token: mira, json: { changes: { encryption: "yes" }, reason: "The enclosure’s board encrypts." } });
  const given = await call("POST", `/api/chips/${ready.chipId}/approval`, { token: ines, json: { sha256: ready.sha256, donorChipId: ready.donorChipId, statement: long("Three equal reads. ", 2000) } });
  expect(given.status, given.bytes.toString("utf8")).toBe(201);
  for (const size of ["a6", "a5"] as const) {
    await open(page, ready.caseId, `write-ticket?of=${ready.chipId}&size=${size}`);
    expect(await stickingOut(page)).toEqual([]);
    const { pictures, text } = await printed(page, size, folder, `write-ticket-${size}`, 1);
    expect(scanned(pictures[0])).toBe(withCheck(ref));
    for (const word of ["Donor board only", ready.sha256.slice(-8), ready.sha256.slice(0, 8), "3.3 V", "64 KiB", "BX 91-0002 rev A, U7", `${ref}_A_U7_Read-1_${ready.sha256.slice(-8)}.bin`]) expect(text).toContain(word);
    expect(text).not.toContain("Void");
  }
  const [approval] = (await chipOf(mira, ready.chipId)).approvals;
  expect((await call("POST", `/api/approvals/${approval.id}/revocation`, { token: ines, json: { reason: long("Misread. ", 900) } })).status).toBeLessThan(300);
  for (const size of ["a6", "a5"] as const) {
    await open(page, ready.caseId, `write-ticket?of=${ready.chipId}&size=${size}`);
    await expect(page.getByRole("main")).toContainText("The ticket is marked void");
    expect(await stickingOut(page)).toEqual([]);
    const { text } = await printed(page, size, folder, `write-ticket-void-${size}`, 1);
    expect(text).toContain("Void: don’t write this image.");
  }
});

test("the papers of an encrypted drive say what stays together", async () => {
  const { page } = desk;
  const other = await makeReady(mira, { customer: "Lindmoor Veterinary Practice" });
  await done("PATCH", `/api/drives/${other.driveId}`, { token: mira, json: { changes: { encryption: "suspected" }, reason: "The enclosure’s board may encrypt." } });
  for (const [what, paper, words] of [["job-ticket", "a5", "small board and the drive stay together"], ["read-sheet", "a4", "small board and the drive stay together"], ["return-slip", "a4", "small board and the drive together"]] as const) {
    await open(page, other.caseId, what);
    expect(await stickingOut(page)).toEqual([]);
    await expect(page.locator(".printed").first(), what).toContainText(words);
    await printed(page, paper, folder, `${what}-encrypted`, what === "read-sheet" ? 2 : 1);
    await open(page, longCase, what);
    await expect(page.locator(".printed").first(), what).not.toContainText(words);
  }
});

test("every paper is reached from the pages of case, drive and chip", async () => {
  const { page } = desk;
  for (const [address, links] of [[`/cases/${ready.caseId}`, 6], [`/drives/${ready.driveId}`, 4], [`/chips/${ready.chipId}`, 4], [`/chips/${ready.donorChipId}`, 3]] as const) {
    await page.goto(address);
    const menu = page.locator("details.menu").filter({ has: page.locator("summary", { hasText: "Print…" }) });
    await menu.locator("summary").click();
    await expect(menu.getByRole("link")).toHaveCount(links);
    for (const href of await menu.getByRole("link").evaluateAll((all) => all.map((one) => one.getAttribute("href")!))) expect((await page.request.get(href)).status(), href).toBe(200);
  }
  for (const odd of ["labels?of=nothing", "labels?of=00000000-0000-4000-8000-000000000000", "passport", `write-ticket?of=${ready.caseId}`]) expect((await page.request.get(`/cases/${longCase}/print/${odd}`)).status(), odd).toBe(404);
});

test("pages printed from the screen say on each sheet what they are and which of how many, and carry no button", async () => {
  const { page } = desk;
  for (const [name, address, what] of [
    ["chip", `/chips/${ready.chipId}`, `Case ${ref}, Drive A, U7`], ["decision", `/chips/${ready.chipId}/decision`, `Case ${ref}, U7, Decision sheet.`],
    ["case", `/cases/${ready.caseId}`, `Case ${ref}.`], ["log", `/drives/${ready.driveId}/custody`, `Case ${ref}, Drive A, Custody log.`],
  ]) {
    await page.goto(address);
    const { pages, text } = await printed(page, "a4", folder, `screen-${name}`);
    const sheets = text.split("\f").slice(0, pages);
    for (const [i, sheet] of sheets.entries()) {
      expect(sheet, `${name}, sheet ${i + 1}`).toContain(what);
      expect(sheet, `${name}, sheet ${i + 1}`).toContain(`Page ${i + 1} of ${pages}`);
    }
    await page.emulateMedia({ media: "print" });
    await expect(page.locator(".btn:visible, main button:visible, header.edge:visible"), name).toHaveCount(0);
    await page.emulateMedia({ media: null });
  }
});
