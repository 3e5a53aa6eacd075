import { expect, type Page } from "@playwright/test";
import { signIn } from "./support/desk";
import { expectTrouble, test } from "./support/test";

/** Whatever the page asks of its own scripts from now on does not come, until the answer is called. */
async function withoutScripts(page: Page): Promise<() => void> {
  let away = true;
  await page.route("**/_next/static/chunks/*", (route) => (away ? route.abort() : route.continue()));
  expectTrouble(/^net::ERR_FAILED GET \/_next\/static\/chunks\//);
  return () => {
    away = false;
  };
}

test("a dialog that can’t be fetched says so, opens once it can, and gives the focus back either way", async ({ browser }) => {
  const { page } = await signIn(browser, "mira");
  const opener = page.getByRole("button", { name: "Keys", exact: true });
  const back = await withoutScripts(page);
  await opener.focus();
  await page.keyboard.press("Enter");
  const missing = page.getByRole("dialog", { name: "This can’t be opened now" });
  await expect(missing).toContainText("Check the network and try again");
  await page.keyboard.press("Escape");
  await expect(missing).toHaveCount(0);
  await expect(opener).toBeFocused();

  await page.keyboard.press("Enter");
  await expect(missing).toBeVisible();
  back();
  await missing.getByRole("button", { name: "Try again" }).click();
  const list = page.getByRole("dialog", { name: "Keys and pages" });
  await expect(list).toBeVisible();
  await expect(list.getByRole("checkbox")).toBeFocused();
  await page.keyboard.press("Escape");
  await expect(opener).toBeFocused();
});

test("a file whose form can’t be checked is not sent, waits on the page, and goes by the same rules afterwards", async ({ browser }) => {
  const { page } = await signIn(browser, "mira");
  const { items } = await (await page.request.get("/api/bench?pageSize=50")).json() as { items: { chip: { id: string; state: { state: string } } }[] };
  await page.goto(`/chips/${items.find((one) => one.chip.state.state === "unread")!.chip.id}`);
  await page.waitForLoadState("networkidle");
  const back = await withoutScripts(page);
  await page.getByLabel("Chip image files").setInputFiles({ name: "read-1.bin", mimeType: "application/octet-stream", buffer: Buffer.alloc(64) });
  await expect(page.getByText("What you typed can’t be checked, because Twinread can’t be reached.")).toBeVisible();
  await expect(page.getByText("read-1.bin waits.")).toBeVisible();
  back();
  await page.getByRole("button", { name: "Send now" }).click();
  await expect(page.getByText("Say which supply was set, or that it is unknown.")).toBeVisible();
  await expect(page.getByText("What you typed can’t be checked")).toHaveCount(0);
  await expect(page.getByRole("list", { name: "Files" }).getByRole("listitem")).toHaveCount(0);
});
