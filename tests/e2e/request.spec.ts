import { execFileSync } from "node:child_process";
import { readdirSync, writeFileSync } from "node:fs";
import path from "node:path";
import { expect, type Page } from "@playwright/test";
import sharp from "sharp";
import { checkCharacter } from "@/lib/core/case-number";
import { expectAccessible } from "./support/axe";
import { openDesk, signIn } from "./support/desk";
import { newFolder } from "./support/files";
import { mailsTo } from "./support/mails";
import { fillRequest, sendRequest } from "./support/request-steps";
import { expectTrouble, test } from "./support/test";

const pictures = process.env.REQUEST_PICTURES;

/** Nothing axe finds in either theme, nothing wider than the window at any width; pictures where they are asked for. */
async function look(page: Page, name: string): Promise<void> {
  for (const [width, theme] of [[1440, "light"], [1440, "dark"], [390, "light"], [390, "dark"], [320, "light"]] as const) {
    await page.setViewportSize({ width, height: 900 });
    await page.emulateMedia({ colorScheme: theme });
    expect(await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth), `${name} at ${width}`).toBeLessThanOrEqual(0);
    await expectAccessible(page, `${name}, ${width} px, ${theme}`, { theme });
    if (pictures) await page.screenshot({ path: path.join(pictures, `${name}-${width}-${theme}.png`), fullPage: true });
  }
  await page.setViewportSize({ width: 1440, height: 1000 });
  await page.emulateMedia({ colorScheme: "light" });
}

/** The page as PDF: how many sheets, and what zbarimg reads from them. */
async function printed(page: Page, name: string): Promise<{ pages: number; codes: string[]; text: string }> {
  const file = path.join(newFolder(), `${name}.pdf`);
  writeFileSync(file, await page.pdf({ preferCSSPageSize: true, printBackground: false }));
  const pages = Number(/^Pages:\s+(\d+)$/m.exec(execFileSync("pdfinfo", [file], { encoding: "utf8" }))![1]);
  execFileSync("pdftoppm", ["-r", "150", "-png", file, path.join(path.dirname(file), name)]);
  const png = path.join(path.dirname(file), readdirSync(path.dirname(file)).find((one) => one.endsWith(".png"))!);
  const codes = execFileSync("zbarimg", ["--quiet", "--raw", png], { encoding: "utf8", stdio: ["ignore", "pipe", "ignore"] }).trim().split("\n");
  if (pictures) execFileSync("cp", [file, png, pictures]);
  return { pages, codes, text: execFileSync("pdftotext", ["-layout", file, "-"], { encoding: "utf8" }) };
}

const photo = async (colour: string) => ({ name: `${colour.slice(1)}.jpg`, mimeType: "image/jpeg", buffer: await sharp({ create: { width: 640, height: 480, channels: 3, background: colour } }).jpeg().toBuffer() });

test("a customer asks for a transfer, prints the slip, and follows the case by private link", async ({ browser }) => {
  test.setTimeout(240_000);
  const { page } = await openDesk(browser);
  const email = "orla.fen@fenworks.example";
  await page.goto("/request");

  await test.step("what is open is named, and each name leads to its field", async () => {
    await page.getByRole("button", { name: "Send the request" }).click();
    const open = page.getByRole("group", { name: "What is open" });
    await expect(open).toBeFocused();
    await expect(open.getByText(/^\d+ things are open\.$/)).toBeVisible();
    await open.getByRole("link", { name: "Type the board number, or tick below that you can’t see it." }).click();
    await expect(page.getByRole("textbox", { name: "Board number" })).toBeFocused();
    await look(page, "request-open");
  });

  await test.step("a likely address is offered, and look-alikes are pointed out", async () => {
    await page.getByLabel("E-mail for the link and the summary").fill("orla.fen@fenworks,example");
    await page.getByRole("button", { name: `Use ${email}` }).click();
    await expect(page.getByLabel("E-mail for the link and the summary")).toHaveValue(email);
    await page.getByRole("textbox", { name: "Part number on the enclosure" }).fill("PN 4471-0093-8");
    await expect(page.getByText("Look twice at 8 and B.")).toBeVisible();
  });

  await fillRequest(page, { name: "Orla Fen", email, partNumber: "PN 4471-0093-B", serial: "9KQ3-70B8-D2", boardNumber: "BX 40-3179" });
  await page.getByLabel("Company").fill("Fenworks & Daughters");
  await page.getByLabel("Revision, next to it").fill("C");
  await page.getByLabel("What was tried since?").fill("Powered once more. Not opened.");
  await page.getByLabel("Choose photos…").setInputFiles([await photo("#224433"), { name: "IMG_1.HEIC", mimeType: "image/heic", buffer: Buffer.from("x") }]);
  await expect(page.getByText(/^IMG_1\.HEIC is a HEIC photo\./)).toBeVisible();
  await expect(page.getByText("1 photo of 8.")).toBeVisible();
  await expect(page.getByText(/^Everything is filled in\./)).toBeVisible();
  await look(page, "request");
  const { refChecked, path: own } = await sendRequest(page);
  const [ref, check] = refChecked.split(".");
  expect(checkCharacter(ref)).toBe(check);

  await test.step("the private page says how it stands", async () => {
    await expect(page.getByRole("heading", { name: "Your request is with us. Your parcel isn’t here yet." })).toBeVisible();
    await expect(page.getByText("1 photo came along.")).toBeVisible();
    await look(page, "customer");
    const answer = await page.request.get(own);
    expect(answer.headers()["cache-control"]).toContain("no-store");
    expect(answer.headers()["referrer-policy"]).toBe("no-referrer");
    expect(await answer.text()).toContain('content="noindex, nofollow');
  });

  await test.step("the slip is one page, and both codes say the case number and nothing else", async () => {
    await page.getByRole("link", { name: "Slip for the parcel" }).click();
    await expect(page.getByRole("heading", { level: 1, name: "Slip for the parcel" })).toBeVisible();
    await look(page, "slip");
    const slip = await printed(page, "slip");
    expect(slip.pages).toBe(1);
    expect([...new Set(slip.codes)]).toEqual([`${refChecked}`]);
    for (const words of ["12 Alder Lane", "Fennick ZZ0 8BD", "Orla Fen", "anti-static", "Seal as sent?"]) expect(slip.text).toContain(words);
  });

  await test.step("the mail carries the same link", async () => {
    await expect.poll(() => mailsTo(email).join("\n"), { timeout: 30_000 }).toContain(own);
    expect(mailsTo("desk@alderlane.example").join("\n")).toContain(refChecked);
  });

  await test.step("the desk sees every answer, and the list shows the request", async () => {
    const ines = await signIn(browser, "ines");
    await ines.page.goto("/cases?state=requested");
    await ines.page.getByRole("link", { name: ref, exact: true }).click();
    const section = ines.page.locator("#request");
    await expect(section.getByText("Fenworks & Daughters")).toBeVisible();
    await expect(section.getByText(/^You may write one image per chip/)).toBeVisible();
    if (pictures) await ines.page.screenshot({ path: path.join(pictures, "desk-1440.png"), fullPage: true });
    await section.getByRole("button", { name: "Send the customer a new link…" }).click();
    await ines.page.getByRole("dialog").getByRole("button", { name: "Send a new link" }).click();
    await expect(ines.page.getByRole("dialog")).toBeHidden();
  });

  const fresh = await test.step("the former link shows nothing, the new one the case", async () => {
    expect((await page.request.get(own)).status()).toBe(404);
    let found: string | undefined;
    await expect.poll(() => (found = mailsTo(email).join("\n").match(/\/request\/[\w-]{43}/g)?.find((one) => one !== own)), { timeout: 30_000 }).toBeTruthy();
    return found!;
  });

  await test.step("asks for deletion, then withdraws", async () => {
    await page.goto(fresh);
    await page.getByRole("button", { name: "Ask for deletion…" }).click();
    await page.getByLabel("Message").fill("The photos first, please.");
    await page.getByRole("dialog").getByRole("button", { name: "Ask for deletion" }).click();
    await expect(page.getByText(/^You asked for deletion on /)).toBeVisible();
    await page.getByRole("button", { name: "Withdraw the request…" }).click();
    await page.getByRole("dialog").getByRole("button", { name: "Withdraw the request" }).click();
    await expect(page.getByRole("heading", { name: "You have withdrawn this request." })).toBeVisible();
    await look(page, "customer-withdrawn");
  });
});

test("on a phone, with a refusal and a reload in between, nothing typed is lost", async ({ browser }) => {
  const context = await browser.newContext({ viewport: { width: 390, height: 844 }, hasTouch: true, isMobile: true });
  const page = await context.newPage();
  await page.goto("/request");
  await fillRequest(page, { name: "عدّة فنش", email: "phone@fenworks.example", partNumber: "PN 4471-0093-B" });
  await page.getByLabel(/^You may write one image/).uncheck();
  await page.getByRole("button", { name: "Send the request" }).click();
  await expect(page.getByRole("group", { name: "What is open" })).toContainText("One thing is open.");
  await page.reload();
  await expect(page.getByLabel("Name", { exact: true })).toHaveValue("عدّة فنش");
  await expect(page.getByLabel(/^I can’t see the board number/)).toBeChecked();
  await expect(page.getByLabel(/^You may read the chips/)).toBeChecked();
  await page.getByLabel(/^You may write one image/).check();
  await sendRequest(page);
  await expect(page.getByText("عدّة فنش").first()).toBeVisible();
  await page.goto("/request");
  await expect(page.getByLabel("Name", { exact: true })).toHaveValue("");
  await context.close();
});

test("a refusal by the server stays with what was typed, and a network that drops makes no second case", async ({ browser }) => {
  const { page } = await openDesk(browser);
  await page.goto("/request");
  await fillRequest(page, { name: "Pim Oder", email: "pim@fenworks.example", partNumber: "PN 1" });
  const tooMany = { type: "about:blank", title: "Too many requests", status: 429, detail: "Many requests came from where you are within the last hour. Try again in 20 minutes, or phone us: 01632 960 100." };
  await page.route("**/api/requests", (route) => route.fulfill({ status: 429, contentType: "application/problem+json", body: JSON.stringify(tooMany) }));
  expectTrouble(/^429 POST \/api\/requests$/);
  await page.getByRole("button", { name: "Send the request" }).click();
  await expect(page.getByRole("group", { name: "What is open" })).toBeFocused();
  await expect(page.getByText(tooMany.detail)).toBeVisible();
  await expect(page.getByLabel("Name", { exact: true })).toHaveValue("Pim Oder");
  await page.unroute("**/api/requests");
  // the answer gets lost on its way: the same request is sent again with the same key
  let first = true;
  let made = "";
  await page.route("**/api/requests", async (route) => {
    const answer = await route.fetch();
    if (!first) return route.fulfill({ response: answer });
    first = false;
    made = ((await answer.json()) as { ref: string }).ref;
    return route.abort();
  });
  expectTrouble(/^net::ERR_FAILED POST \/api\/requests$/);
  await page.waitForTimeout(3000);
  await page.getByRole("button", { name: "Send the request" }).click();
  await expect(page.getByText(/^The workshop’s page can’t be reached right now\./)).toBeVisible();
  const { refChecked } = await sendRequest(page);
  expect(refChecked.split(".")[0]).toBe(made);
});

test("the longest answers still make a slip of one page, and markup stays text", async ({ browser }) => {
  const { page } = await openDesk(browser);
  await page.goto("/request");
  const nasty = '<img src=x onerror="document.title=1"><b>x</b> ';
  await fillRequest(page, { name: (nasty + "N".repeat(200)).slice(0, 200), email: `${"a".repeat(60)}@${"b".repeat(60)}.${"c".repeat(60)}.example`, partNumber: "9".repeat(120), serial: (nasty + "8".repeat(120)).slice(0, 120), boardNumber: "7".repeat(120), happened: nasty.repeat(40) });
  await page.getByLabel("Company").fill("W".repeat(200));
  await page.getByLabel("Phone").fill("0".repeat(60));
  await page.getByLabel("What was tried since?").fill("tried ".repeat(300));
  const { path: own } = await sendRequest(page);
  await expect(page.getByText("<b>x</b>").first()).toBeVisible();
  await look(page, "customer-longest");
  await page.goto(`${own}/slip`);
  await look(page, "slip-longest");
  expect((await printed(page, "slip-longest")).pages).toBe(1);
});

test("a link that isn't one shows the same page as one that has ended", async ({ browser }) => {
  const { page } = await openDesk(browser);
  for (const path of [`/request/${"x".repeat(43)}`, "/request/short", `/request/${"x".repeat(43)}/slip`]) {
    expectTrouble(new RegExp(`^404 GET ${path}$`));
    expect((await page.goto(path))!.status()).toBe(404);
    await expect(page.getByRole("heading", { name: "This link shows nothing." })).toBeVisible();
  }
});
