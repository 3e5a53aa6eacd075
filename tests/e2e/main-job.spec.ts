import { execFileSync } from "node:child_process";
import { readFileSync } from "node:fs";
import path from "node:path";
import { expect, test } from "@playwright/test";
import { checkWithoutTwinread, saveBundle } from "./support/bundle";
import { addBoard, addChip, addDrive, openChip, recordCase } from "./support/case-steps";
import { askForApproval, readRow, recordWrite, sign, state, upload, verdict } from "./support/chip-steps";
import { type Desk, openDesk, signIn } from "./support/desk";
import { sendSummary, summaryLink } from "./support/end-steps";
import { copies, gzipCrc, newFolder, OVMF_VARS, SEABIOS, sha256sum } from "./support/files";

const CUSTOMER = { customer: "Ferrow Tide Survey", email: "bridge@ferrowtide.example", damage: "Lightning stroke; the drive does not spin up" };
const BOARD = { boardNumber: "BX 47-5520", revision: "rev B" };
/** Real firmware, and a real parameter store that is almost all FF. */
const CHIPS = [
  { designator: "U3", size: "256 KiB", bytes: 262_144, image: SEABIOS },
  { designator: "U12", size: "1 Mbit", bytes: 131_072, image: OVMF_VARS },
];

test("two real images go from the original's chips to the donor's, and anybody can check it", async ({ browser }) => {
  test.setTimeout(180_000);
  const folder = newFolder();
  const desks: Desk[] = [];
  const at = async (opened: Promise<Desk>) => {
    desks.push(await opened);
    return desks[desks.length - 1].page;
  };

  const mira = await at(signIn(browser, "mira"));
  const caseUrl = await test.step("mira records case, drive, boards and chips", async () => {
    const url = await recordCase(mira, CUSTOMER);
    await addDrive(mira, { partNumber: "PN 6203-0018-D", serial: "QF-2207-51" });
    await addBoard(mira, "original", BOARD);
    await addBoard(mira, "donor", BOARD);
    for (const role of ["original", "donor"] as const) for (const chip of CHIPS) await addChip(mira, role, chip);
    return url;
  });

  for (const { designator, bytes, image } of CHIPS) {
    await test.step(`${designator}: three reads in two seatings, the donor's content saved`, async () => {
      const donorImage = path.join(folder, `donor-${designator}.bin`);
      execFileSync("dd", ["if=/dev/urandom", `of=${donorImage}`, `bs=${bytes}`, "count=1", "iflag=fullblock", "status=none"]);
      await openChip(mira, caseUrl, designator);
      await expect(state(mira)).toHaveText("To read");
      const reads = copies(folder, image, [1, 2, 3].map((n) => `${designator}_r${n}.bin`));
      await upload(mira, "before", 1, reads.slice(0, 2));
      await upload(mira, "before", 2, reads.slice(2));
      await upload(mira, "donor", 1, copies(folder, donorImage, [`${designator}_own1.bin`, `${designator}_own2.bin`]));
      await expect(state(mira)).toHaveText("Waiting for approval");
      await expect(readRow(mira, /^Read \d$/)).toHaveCount(3);
      for (const row of await readRow(mira, /^Read \d$/).all()) await expect(row).toContainText(gzipCrc(image));
      await askForApproval(mira, `${designator} reads the same three times.`);
    });
  }

  const ines = await at(signIn(browser, "ines"));
  for (const { designator, image } of CHIPS) {
    await test.step(`ines signs for ${designator}`, async () => {
      await openChip(ines, caseUrl, designator);
      await ines.getByRole("link", { name: "Open the decision sheet" }).first().click();
      await sign(ines, sha256sum(image));
    });
  }

  for (const { designator, size, bytes, image } of CHIPS) {
    await test.step(`${designator}: handed out, written, read back in two seatings`, async () => {
      await openChip(mira, caseUrl, designator);
      await expect(state(mira)).toHaveText("Cleared to write");
      const saving = mira.waitForEvent("download");
      await mira.getByRole("button", { name: /^Approved image/ }).click();
      const written = path.join(folder, `${designator}_written.bin`);
      await (await saving).saveAs(written);
      expect(readFileSync(written).equals(readFileSync(image)), `${size} handed out, byte for byte`).toBe(true);
      await recordWrite(mira);
      await expect(state(mira)).toHaveText("To read back");
      const [first, second] = copies(folder, written, [`${designator}_back1.bin`, `${designator}_back2.bin`]);
      await upload(mira, "after", 1, [first]);
      await expect(state(mira)).toHaveText("To read back");
      await upload(mira, "after", 2, [second]);
      await expect(state(mira)).toHaveText("Verified");
      await expect(verdict(mira)).toContainText(`Both read-backs equal the approved image in all ${bytes.toLocaleString("en")} bytes.`);
    });
  }

  const link = await test.step("ines sends the summary", async () => {
    await ines.goto(caseUrl);
    await sendSummary(ines);
    return summaryLink(CUSTOMER.email);
  });

  await test.step("the customer reads the summary without an account", async () => {
    const customer = await at(openDesk(browser));
    await customer.goto(link);
    await expect(customer.getByRole("heading", { level: 1, name: "Verification summary" })).toBeVisible();
    const text = (await customer.getByRole("main").innerText()).replace(/\s+/g, "");
    for (const { image } of CHIPS) {
      expect(text).toContain(sha256sum(image));
      expect(text).toContain(gzipCrc(image));
    }
    await expect(customer.getByText("Verified", { exact: true })).toHaveCount(2);
  });

  await test.step("rhys takes the bundle, and it checks out without Twinread", async () => {
    const rhys = await at(signIn(browser, "rhys"));
    await rhys.goto(caseUrl);
    const bag = checkWithoutTwinread(await saveBundle(rhys, folder), folder);
    const manifest = readFileSync(path.join(bag, "manifest-sha256.txt"), "utf8");
    for (const { image } of CHIPS) expect(manifest.split("\n").filter((line) => line.startsWith(sha256sum(image)))).toHaveLength(5);
  });

  await test.step("the custody log of the drive checks out on its page", async () => {
    await ines.goto(caseUrl);
    await ines.getByRole("link", { name: /^Custody log, \d+ entries$/ }).click();
    await ines.getByRole("button", { name: /^Check the log/ }).click();
    await expect(ines.getByText(/^All \d+ entries link\. Nothing was changed/)).toBeVisible();
  });

  for (const desk of desks) expect(desk.troubles).toEqual([]);
});
