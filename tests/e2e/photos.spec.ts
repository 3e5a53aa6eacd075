import { readFileSync } from "node:fs";
import { expect } from "@playwright/test";
import sharp from "sharp";
import type { PhotoView } from "@/lib/views";
import { ftyp, pdf, picture, polyglot } from "../support/pictures";
import { makePair, type Pair, sha256Of } from "./support/bench";
import { signIn } from "./support/desk";
import { type Answer, call, expectProblem, tokenOf } from "./support/station";
import { incoming } from "./support/store";
import { expectTrouble, test } from "./support/test";

const MIB = 1024 * 1024;
const RAN = "document.title='ran'";

let mira: string;
let pair: Pair;
test.beforeAll(async () => {
  mira = await tokenOf("mira");
  pair = await makePair(mira, { customer: "Photos", sizeBytes: 4096 });
});

interface Sent {
  bytes: Uint8Array;
  name?: string;
}
async function send(path: string, files: Sent[], { token = mira, fields = [] as [string, string][], headers = {} as Record<string, string> } = {}): Promise<Answer> {
  const form = new FormData();
  for (const [name, value] of fields) form.append(name, value);
  for (const { bytes, name = "photo.jpg" } of files) form.append("file", new Blob([new Uint8Array(bytes)]), name);
  return call("POST", `/api/${path}/photos`, { token, body: form, headers });
}
async function stored(path: string, bytes: Uint8Array, name?: string): Promise<PhotoView> {
  const answer = await send(path, [{ bytes, name }]);
  expect(answer.status, answer.bytes.toString("utf8")).toBe(201);
  return answer.json<{ photos: PhotoView[] }>().photos[0];
}
const listOf = async (path: string) => (await call("GET", `/api/${path}/photos`, { token: mira })).json<{ photos: PhotoView[] }>().photos;

test("limits hold while the bytes come, and nothing is left of what was refused", async () => {
  // a server that a test before this one killed may have left pieces of its own
  const before = incoming();
  const drive = `drives/${pair.driveId}`;
  const good = await picture();
  const large = new Uint8Array(20 * MIB + 1);
  large.set([0xff, 0xd8, 0xff]);
  expectProblem(await send(drive, [{ bytes: good }, { bytes: large }]), 413, /larger than 20 MiB/);
  expectProblem(await send(drive, Array.from({ length: 17 }, () => ({ bytes: good }))), 400, /At most 16 files/);
  expectProblem(await send(drive, [{ bytes: good }, { bytes: ftyp("heic", "mif1"), name: "IMG_1.HEIC" }]), 415, /^IMG_1\.HEIC: This is a HEIC photo\. Set the phone's camera to 'most compatible', or share it as JPEG, then send it again\./);
  expectProblem(await send(drive, [{ bytes: Buffer.from(`<svg xmlns="http://www.w3.org/2000/svg"><script>${RAN}</script></svg>`), name: "a.png" }]), 415, /markup \(SVG, HTML\)/);
  expectProblem(await send(drive, [{ bytes: good.subarray(0, 5000) }]), 422, /breaks off/);
  expectProblem(await send(drive, [{ bytes: good }], { fields: [["caption", "a"], ["caption", "b"]] }), 422, /caption for every file or for none/);
  expectProblem(await call("POST", `/api/${drive}/photos`, { token: mira, json: {} }), 415, /multipart/);
  expect(await listOf(drive)).toEqual([]);
  expect(incoming()).toEqual(before);
});

test("who may add is asked before any byte is taken, and a repeated call stores nothing twice", async () => {
  const auditor = await tokenOf("rhys");
  expectProblem(await send(`drives/${pair.driveId}`, [{ bytes: new Uint8Array(30 * MIB) }], { token: auditor }), 403, /As auditor/);
  const bytes = await picture();
  const headers = { "idempotency-key": `photo ${sha256Of(bytes)}` };
  const [first, second] = [await send(`chips/${pair.chipId}`, [{ bytes }], { headers }), await send(`chips/${pair.chipId}`, [{ bytes }], { headers })];
  expect([first.status, second.status]).toEqual([201, 201]);
  expect(second.json()).toEqual(first.json());
  expect(await listOf(`chips/${pair.chipId}`)).toHaveLength(1);
});

test("the original leaves as a file to save, the copy as an image without the place where it was taken", async () => {
  const bytes = await picture({ location: true, width: 2400, height: 1200 });
  const photo = await stored(`cases/${pair.caseId}`, bytes, "holiday.jpg");
  expect(photo.hadLocation).toBe(true);
  const original = await call("GET", `/api/photos/${photo.id}`, { token: mira });
  expect(original.bytes.equals(bytes)).toBe(true);
  expect(original.headers.get("content-disposition")).toMatch(/^attachment; filename="case-photo-[0-9a-f]{8}\.jpg"$/);
  expect(original.headers.get("repr-digest")).toBe(`sha-256=:${Buffer.from(sha256Of(bytes), "hex").toString("base64")}:`);
  for (const size of ["", "=1600", "=400"]) {
    const copy = await call("GET", `/api/photos/${photo.id}?reduced${size}`, { token: mira });
    expect(copy.headers.get("content-type")).toBe("image/jpeg");
    expect(copy.headers.get("content-disposition")).toMatch(/^inline; filename="case-photo-[0-9a-f]{8}\.jpg"$/);
    expect((await sharp(copy.bytes).metadata()).exif).toBeUndefined();
    for (const answer of [original, copy]) {
      expect(answer.headers.get("x-content-type-options")).toBe("nosniff");
      expect(answer.headers.get("content-security-policy")).toBe("default-src 'none'; frame-ancestors 'none'; sandbox");
      expect(answer.headers.get("cache-control")).toBe("no-store");
    }
  }
  expectProblem(await call("GET", `/api/photos/${photo.id}?reduced=90000`, { token: mira }), 422, /1600 or 400/);
  expect((await call("GET", `/api/photos/${photo.id}?reduced`)).status).toBe(401);
});

test("a page inside a photo runs nowhere: not as the copy, not as the original, not in a frame, not as a script", async ({ browser }) => {
  const { page, context } = await signIn(browser, "mira");
  const photo = await stored(`boards/${pair.boardId}`, await polyglot(RAN));
  const paper = await stored(`boards/${pair.boardId}`, pdf(`<script>${RAN}</script>`), "papers.pdf");
  // the browser's own frame around a lone image has styles, which the photo's address allows as little as scripts
  expectTrouble(/^error: Applying inline style violates .*'default-src 'none''.* \(\/api\/photos\/[\w-]+\?reduced\)$/);
  await page.goto(`/api/photos/${photo.id}?reduced`);
  expect(await page.title()).not.toBe("ran");
  expect(await page.evaluate(() => document.images.length)).toBe(1);
  for (const one of [photo, paper]) {
    const opened = await context.newPage();
    const download = opened.waitForEvent("download");
    // a page that turns into a download has no answer of its own
    await opened.goto(`/api/photos/${one.id}`).catch(() => null);
    expect((await download).suggestedFilename()).toMatch(/^board-(photo|document)-[0-9a-f]{8}\.(jpg|pdf)$/);
    expect(await opened.title()).not.toBe("ran");
    await opened.close();
  }
  await page.goto(`/drives/${pair.driveId}`);
  const title = await page.title();
  expectTrouble(/^error: Refused to execute script from '\S+\/api\/photos\/[\w-]+' because its MIME type/);
  const seen = await page.evaluate(async (address) => {
    const frame = document.createElement("iframe");
    frame.src = address;
    document.body.append(frame);
    await new Promise((done) => setTimeout(done, 1500));
    const script = document.createElement("script");
    const ran = new Promise<string>((done) => { script.onload = () => done("loaded"); script.onerror = () => done("refused"); });
    script.src = address;
    document.body.append(script);
    return { script: await ran, inside: frame.contentDocument?.body?.innerHTML.includes("script") ?? false };
  }, `/api/photos/${photo.id}`);
  expect(seen).toEqual({ script: "refused", inside: false });
  expect(await page.title()).toBe(title);
});

test("photos are chosen, told why not, seen larger and walked through by keyboard", async ({ browser }) => {
  const { page } = await signIn(browser, "mira");
  const own = await makePair(mira, { customer: "Photos on screen", sizeBytes: 4096 });
  await page.goto(`/drives/${own.driveId}`);
  const drive = page.getByRole("region", { name: "Photos of Drive A" });
  const [label, connector] = [await picture({ location: true }), await picture({ format: "png" })];
  await drive.getByLabel(/^Caption/).fill("The label");
  await drive.locator("input[type=file][multiple]").setInputFiles([
    { name: "label.jpg", mimeType: "image/jpeg", buffer: label }, { name: "IMG_7.HEIC", mimeType: "image/heic", buffer: ftyp("heic", "mif1") },
  ]);
  // two at once go beside each other, and the smaller one may be there first
  await expect(drive.getByText("Stored", { exact: true })).toHaveCount(1);
  await drive.locator("input[type=file][multiple]").setInputFiles([{ name: "connector.png", mimeType: "image/png", buffer: connector }]);
  await expect(drive.getByRole("list", { name: /^Photos of/ }).getByRole("listitem")).toHaveCount(2);
  await expect(drive.getByRole("alert")).toHaveText(/This is a HEIC photo\. Set the phone's camera/);
  await drive.getByRole("button", { name: "Take IMG_7.HEIC off the list" }).click();
  await expect(drive.getByRole("alert")).toHaveCount(0);
  const card = drive.getByRole("listitem").filter({ hasText: "label.jpg" }).first();
  await expect(card).toContainText("The original says where it was taken");
  const thumb = card.getByRole("link").locator("img");
  await expect.poll(() => thumb.evaluate((img: HTMLImageElement) => img.naturalWidth)).toBe(400);

  await card.getByRole("link").focus();
  await page.keyboard.press("Enter");
  await expect(page.getByRole("heading", { level: 1, name: "The label" })).toBeVisible();
  await expect(page.getByText("1 of 2")).toBeVisible();
  await page.keyboard.press("ArrowRight");
  await expect(page.getByText("2 of 2")).toBeVisible();
  await page.keyboard.press("ArrowLeft");
  await expect(page.getByText("1 of 2")).toBeVisible();
  const saved = page.waitForEvent("download");
  await page.getByRole("link", { name: "Download the original" }).click();
  expect(sha256Of(readFileSync(await (await saved).path()))).toBe(sha256Of(label));
  await page.getByRole("link", { name: /^Back to/ }).click();
  await expect(page.getByRole("heading", { level: 2, name: "Photos" })).toBeVisible();
});
