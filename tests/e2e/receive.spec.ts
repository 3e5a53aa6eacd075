import { expect, type Page } from "@playwright/test";
import { withCheck } from "@/lib/core/case-number";
import { openDesk, signIn } from "./support/desk";
import { putRequest } from "./support/requested";
import { test } from "./support/test";

const box = (page: Page) => page.getByLabel("Case number", { exact: true });
const trouble = (page: Page) => page.getByRole("main").getByRole("alert");

/** Types like a handheld scanner: the characters, then Enter. */
async function scan(page: Page, text: string): Promise<void> {
  await page.goto("/receive");
  await expect(box(page)).toBeFocused();
  await page.keyboard.type(text);
  await page.keyboard.press("Enter");
}

test("a parcel is found by its number, compared with its request, received once, and its drive comes next", async ({ browser }) => {
  const { caseId, ref } = await putRequest({ name: "Reed Bank Nursery" });
  const { page } = await signIn(browser, "mira");
  await expect(page.getByRole("row", { name: new RegExp(ref) })).toContainText("Receive the parcel when it comes.");

  const checked = withCheck(ref);
  const wrong = `${ref}.${checked.endsWith("7") ? "8" : "7"}`;
  await scan(page, wrong);
  await expect(trouble(page)).toContainText(`The check character does not fit ${ref}`);
  await scan(page, "a parcel");
  await expect(trouble(page)).toContainText("This is not a case number.");
  await scan(page, "26-987654");
  await expect(trouble(page)).toContainText("There is no case 26-987654 here.");
  await page.getByRole("link", { name: "record a case from the parcel" }).click();
  await expect(page.getByLabel("Bench note")).toHaveValue("The slip in the parcel says 26-987654.");

  await scan(page, checked.toLowerCase());
  await expect(page.getByRole("heading", { level: 1 })).toHaveText(`Parcel of case ${checked}`);
  await page.getByRole("button", { name: "Receive the parcel" }).click();
  await expect(page.getByText("Look at the seal and choose one.")).toBeVisible();
  await expect(page.getByText("Give the condition of the parcel.")).toBeVisible();
  await page.getByRole("button", { name: "All lines are as sent" }).click();
  await page.getByRole("group", { name: /^Serial number/ }).getByLabel("not so").check();
  await page.getByRole("button", { name: "Receive the parcel" }).click();
  await expect(page.getByText("Say what is different.")).toBeVisible();
  await page.getByLabel("What is there instead").fill("9KQ3-70BB-D2");
  await page.getByRole("group", { name: "Is the seal as it was sent?" }).getByLabel("as sent").check();
  await page.getByLabel("Number of the seal").fill("S-90211");
  await page.getByRole("group", { name: /^Is the enclosure here/ }).getByLabel("here", { exact: true }).check();
  await page.getByLabel("Carrier").fill("Marsh Post");
  await page.getByLabel("Condition of the parcel").fill("One corner crushed, padding whole");
  await page.getByRole("button", { name: "Receive the parcel" }).click();

  await expect(page.getByRole("heading", { level: 1 })).toHaveText(`Parcel received, case ${checked}`);
  await expect(page.getByText("Serial number is not so: 9KQ3-70BB-D2.")).toBeVisible();
  const next = page.getByRole("link", { name: "Record the drive" });
  expect(await next.getAttribute("href")).toBe(`/cases/${caseId}?record=drive&partNumber=PN+4471-0093-B&serial=9KQ3-70B8-D2`);
  await page.goto(`/cases/${caseId}`);
  await expect(page.getByRole("main")).toContainText("The parcel is not as the request said.");
  await scan(page, ref);
  await expect(page.getByText(`The parcel of case ${ref} is here already.`)).toBeVisible();
  await page.goto("/bench");
  await expect(page.getByRole("row", { name: new RegExp(`Receive: case ${ref}`) })).toHaveCount(0);
});

test("a browser that can't scan says so, and the number can be typed", async ({ browser }) => {
  const { page } = await signIn(browser, "tomas");
  await page.addInitScript(() => { Reflect.deleteProperty(globalThis, "BarcodeDetector"); });
  await page.goto("/receive");
  await page.getByRole("button", { name: "Scan with the camera" }).click();
  await expect(trouble(page)).toHaveText(/This browser can't scan\. Type the number\./);
  await expect(page.getByRole("button", { name: "Scan with the camera" })).toBeVisible();
});

test("the camera reads a slip, can be stopped, and is let go of", async ({ browser }) => {
  const { ref, caseId } = await putRequest({ name: "Tern Island Radio" });
  const { page } = await signIn(browser, "mira");
  // a camera that shows a canvas, and a reader that sees what the test holds before it
  await page.addInitScript(() => {
    const world = globalThis as unknown as { seen: string[]; tracks: MediaStreamTrack[]; BarcodeDetector: unknown };
    world.seen = [];
    world.tracks = [];
    const canvas = document.createElement("canvas");
    const draw = () => { canvas.getContext("2d")?.fillRect(0, 0, 20, 20); requestAnimationFrame(draw); };
    navigator.mediaDevices.getUserMedia = async () => {
      draw();
      const stream = canvas.captureStream(10);
      world.tracks.push(...stream.getTracks());
      return stream;
    };
    world.BarcodeDetector = class {
      static getSupportedFormats = async () => ["qr_code"];
      detect = async () => world.seen.map((rawValue) => ({ rawValue }));
    };
  });
  const states = () => page.evaluate(() => (globalThis as unknown as { tracks: MediaStreamTrack[] }).tracks.map((track) => track.readyState));
  const show = (text: string) => page.evaluate((seen) => { (globalThis as unknown as { seen: string[] }).seen = [seen]; }, text);

  await page.goto("/receive");
  await page.getByRole("button", { name: "Scan with the camera" }).click();
  await expect(page.getByLabel("Picture of the camera")).toBeVisible();
  await expect.poll(states).toEqual(["live"]);
  await page.getByRole("button", { name: "Stop the camera" }).click();
  await expect.poll(states).toEqual(["ended"]);

  await page.getByRole("button", { name: "Scan with the camera" }).click();
  await expect.poll(states).toEqual(["ended", "live"]);
  await show("https://elsewhere.example/");
  await expect(trouble(page)).toContainText("This is not a case number.");
  await show(withCheck(ref));
  await expect(page).toHaveURL(new RegExp(`/receive/${caseId}$`));
  await expect.poll(states).toEqual(["ended", "ended"]);
});

test("a camera that is not allowed or not there is told of in a sentence", async ({ browser }) => {
  const { page } = await signIn(browser, "mira");
  await page.addInitScript(() => {
    const world = globalThis as unknown as { BarcodeDetector: unknown };
    world.BarcodeDetector = class { static getSupportedFormats = async () => ["qr_code"]; };
    const name = new URL(location.href).searchParams.get("why") ?? "NotFoundError";
    navigator.mediaDevices.getUserMedia = () => Promise.reject(new DOMException("no", name));
  });
  for (const [why, sentence] of [["NotAllowedError", /was not allowed/], ["NotFoundError", /No camera was found/], ["NotReadableError", /does not start/]] as const) {
    await page.goto(`/receive?why=${why}`);
    await page.getByRole("button", { name: "Scan with the camera" }).click();
    await expect(trouble(page)).toHaveText(sentence);
  }
});

test("an auditor looks at the papers of a case and receives nothing", async ({ browser }) => {
  const { caseId } = await putRequest({ name: "Otter Weir School" });
  const { page } = await signIn(browser, "rhys");
  await page.goto("/receive");
  await expect(page).toHaveURL(/\/bench$/);
  await page.goto(`/receive/${caseId}`);
  await expect(page).toHaveURL(/\/bench$/);
  await page.goto(`/cases/${caseId}`);
  await expect(page.getByRole("link", { name: "Receive the parcel" })).toHaveCount(0);
  await page.goto(`/cases/${caseId}/print/receipt`);
  await expect(page.getByRole("heading", { name: "Receipt", exact: true })).toBeVisible();
});

test("nobody who is not signed in sees a paper", async ({ browser }) => {
  const { caseId } = await putRequest({ name: "Quarry Lane Choir" });
  const { page } = await openDesk(browser);
  for (const what of ["labels", "job-ticket", "receipt"]) {
    await page.goto(`/cases/${caseId}/print/${what}`);
    await expect(page).toHaveURL(/\/sign-in/);
  }
});
