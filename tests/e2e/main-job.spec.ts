import { execFileSync } from "node:child_process";
import { readFileSync } from "node:fs";
import path from "node:path";
import { expect } from "@playwright/test";
import { checkWithoutTwinread, saveBundle } from "./support/bundle";
import { readRow, state, verdict } from "./support/chip-steps";
import { openDesk } from "./support/desk";
import { summaryLink } from "./support/end-steps";
import { copies, gzipCrc, newFolder, OVMF_VARS, SEABIOS, sha256sum } from "./support/files";
import { addBoard, addChip, addDrive, askForApproval, findCase, findChip, recordCase, recordWrite, sendSummary, sign, signInByKeys, upload } from "./support/keyboard-steps";
import { test } from "./support/test";

const CUSTOMER = { customer: "Ferrow Tide Survey", email: "bridge@ferrowtide.example", damage: "Lightning stroke; the drive does not spin up" };
const BOARD = { boardNumber: "BX 47-5520", revision: "rev B" };
/** Real firmware, and a real parameter store that is almost all FF. */
const CHIPS = [
  { designator: "U3", size: "256 KiB", bytes: 262_144, image: SEABIOS },
  { designator: "U12", size: "1 Mbit", bytes: 131_072, image: OVMF_VARS },
];

test("two real images go from the original's chips to the donor's without a pointer, and anybody can check it", async ({ browser }) => {
  test.setTimeout(240_000);
  const folder = newFolder();

  const mira = await signInByKeys(browser, "mira");
  const ref = await test.step("mira records case, drive, boards and chips", async () => {
    const number = await recordCase(mira, CUSTOMER);
    await addDrive(mira, { partNumber: "PN 6203-0018-D", serial: "QF-2207-51" });
    await addBoard(mira, "original", BOARD);
    await addBoard(mira, "donor", BOARD);
    for (const role of ["original", "donor"] as const) for (const chip of CHIPS) await addChip(mira, role, chip);
    return number;
  });

  for (const { designator, bytes, image } of CHIPS) {
    await test.step(`${designator}: three reads in two seatings, the donor's content saved`, async () => {
      const donorImage = path.join(folder, `donor-${designator}.bin`);
      execFileSync("dd", ["if=/dev/urandom", `of=${donorImage}`, `bs=${bytes}`, "count=1", "iflag=fullblock", "status=none"]);
      await findChip(mira, ref, designator);
      await expect(state(mira.page)).toHaveText("To read");
      const reads = copies(folder, image, [1, 2, 3].map((n) => `${designator}_r${n}.bin`));
      await upload(mira, "before", 1, reads.slice(0, 2));
      await upload(mira, "before", 2, reads.slice(2));
      await upload(mira, "donor", 1, copies(folder, donorImage, [`${designator}_own1.bin`, `${designator}_own2.bin`]));
      await expect(state(mira.page)).toHaveText("Waiting for approval");
      await expect(readRow(mira.page, /^Read \d$/)).toHaveCount(3);
      for (const row of await readRow(mira.page, /^Read \d$/).all()) await expect(row).toContainText(gzipCrc(image));
      await askForApproval(mira, `${designator} reads the same three times.`);
    });
  }

  const ines = await signInByKeys(browser, "ines");
  for (const { designator, image } of CHIPS) {
    await test.step(`ines signs for ${designator}`, async () => {
      await findChip(ines, ref, designator);
      await ines.press(ines.page.getByRole("link", { name: "Open the decision sheet" }).first());
      await sign(ines, sha256sum(image));
    });
  }

  for (const { designator, size, bytes, image } of CHIPS) {
    await test.step(`${designator}: handed out, written, read back in two seatings`, async () => {
      await findChip(mira, ref, designator);
      await expect(state(mira.page)).toHaveText("Cleared to write");
      const saving = mira.page.waitForEvent("download");
      await mira.press(mira.page.getByRole("button", { name: /^Approved image/ }));
      const written = path.join(folder, `${designator}_written.bin`);
      await (await saving).saveAs(written);
      expect(readFileSync(written).equals(readFileSync(image)), `${size} handed out, byte for byte`).toBe(true);
      await recordWrite(mira);
      await expect(state(mira.page)).toHaveText("To read back");
      const [first, second] = copies(folder, written, [`${designator}_back1.bin`, `${designator}_back2.bin`]);
      await upload(mira, "after", 1, [first]);
      await expect(state(mira.page)).toHaveText("To read back");
      await upload(mira, "after", 2, [second]);
      await expect(state(mira.page)).toHaveText("Verified");
      await expect(verdict(mira.page)).toContainText(`Both read-backs equal the approved image in all ${bytes.toLocaleString("en")} bytes.`);
    });
  }

  const link = await test.step("ines sends the summary", async () => {
    await findCase(ines, ref);
    await sendSummary(ines);
    return summaryLink(CUSTOMER.email);
  });

  await test.step("the customer reads the summary without an account", async () => {
    const { page } = await openDesk(browser);
    await page.goto(link);
    await expect(page.getByRole("heading", { level: 1, name: "Verification summary" })).toBeVisible();
    const text = (await page.getByRole("main").innerText()).replace(/\s+/g, "");
    for (const { image } of CHIPS) {
      expect(text).toContain(sha256sum(image));
      expect(text).toContain(gzipCrc(image));
    }
    await expect(page.getByText("Verified", { exact: true })).toHaveCount(2);
  });

  await test.step("rhys takes the bundle, and it checks out without Twinread", async () => {
    const rhys = await signInByKeys(browser, "rhys");
    await findCase(rhys, ref);
    const bag = checkWithoutTwinread(await saveBundle(rhys.page, folder, (button) => rhys.press(button)), folder);
    const manifest = readFileSync(path.join(bag, "manifest-sha256.txt"), "utf8");
    for (const { image } of CHIPS) expect(manifest.split("\n").filter((line) => line.startsWith(sha256sum(image)))).toHaveLength(5);
  });

  await test.step("the custody log of the drive checks out on its page", async () => {
    await ines.press(ines.page.getByRole("link", { name: /^Custody log, \d+ entries$/ }));
    await ines.press(ines.page.getByRole("button", { name: /^Check the log/ }));
    await expect(ines.page.getByText(/^All \d+ entries link\. Nothing was changed/)).toBeVisible();
  });
});
