import { execFileSync } from "node:child_process";
import { readFileSync, writeFileSync } from "node:fs";
import path from "node:path";
import { expect, type Page } from "@playwright/test";
import { picture } from "../support/pictures";
import { randomImage } from "./support/bench";
import { checkWithoutTwinread, saveBundle } from "./support/bundle";
import { openChip } from "./support/case-steps";
import { askForApproval, readRow, recordWrite, sign, state, upload, verdict } from "./support/chip-steps";
import { type Desk, openDesk, signIn } from "./support/desk";
import { handOver, recordStartUp, sendSummary, summaryLink } from "./support/end-steps";
import { copies, newFolder, sha256sum } from "./support/files";
import { printed, scanned } from "./support/paper";
import { fillRequest, sendRequest } from "./support/request-steps";
import { expectTrouble, test } from "./support/test";

const WISH = { name: "Gullmere Sailmakers", email: "loft@gullmere.example", partNumber: "PN 7715-0042-C", serial: "LK-8803-27", boardNumber: "BX 48-1107" };
const REVISION = "rev A";
const BYTES = 65_536;

const dialogOf = (page: Page, name: string | RegExp) => page.getByRole("dialog", { name });
const section = (page: Page, name: string) => page.locator("section").filter({ has: page.getByRole("heading", { level: 2, name, exact: true }) });

function imageFile(folder: string, name: string): string {
  const file = path.join(folder, name);
  writeFileSync(file, randomImage(BYTES));
  return file;
}

test("a case goes from the public form to its closing, by the customer, two technicians, a lead and an auditor", async ({ browser }) => {
  test.setTimeout(240_000);
  const folder = newFolder();
  const at = async (opened: Promise<Desk>) => (await opened).page;
  const customer = await at(openDesk(browser));

  const { refChecked, path: own } = await test.step("the customer asks for a transfer", async () => {
    await customer.goto("/request");
    await fillRequest(customer, WISH);
    await customer.getByLabel("Revision, next to it").fill(REVISION);
    return sendRequest(customer);
  });
  const [ref] = refChecked.split(".");
  /** How it stands, as the customer reads it on the private page. */
  const customerReads = async (sentence: string) => {
    await customer.goto(own);
    await expect(customer.getByRole("heading", { level: 2, name: sentence })).toBeVisible();
  };

  const onTheSlip = await test.step("and prints the slip", async () => {
    await customerReads("Your request is with us. Your parcel isn’t here yet.");
    await customer.getByRole("link", { name: "Slip for the parcel" }).click();
    await expect(customer.getByRole("heading", { level: 1, name: "Slip for the parcel" })).toBeVisible();
    const slip = await printed(customer, "a4", folder, "whole-case-slip", 1);
    const codes = scanned(slip.pictures[0]).split("\n");
    expect([...new Set(codes)]).toEqual([refChecked]);
    return codes[0];
  });

  const mira = await at(signIn(browser, "mira"));
  await test.step("mira scans the slip, compares the parcel and takes it in with a photo", async () => {
    await mira.getByRole("link", { name: "Receive", exact: true }).click();
    await expect(mira.getByLabel("Case number", { exact: true })).toBeFocused();
    await mira.keyboard.type(onTheSlip);
    await mira.keyboard.press("Enter");
    await expect(mira.getByRole("heading", { level: 1, name: `Parcel of case ${refChecked}` })).toBeVisible();
    await mira.getByRole("button", { name: "All lines are as sent" }).click();
    await mira.getByRole("group", { name: "Is the seal as it was sent?" }).getByLabel("as sent").check();
    await mira.getByRole("group", { name: /^Is the enclosure here/ }).getByLabel("here", { exact: true }).check();
    await mira.getByLabel("Condition of the parcel").fill("Whole, board in a closed anti-static bag");
    await mira.getByRole("button", { name: "Receive the parcel" }).click();
    await expect(mira.getByRole("heading", { level: 1, name: `Parcel received, case ${refChecked}` })).toBeVisible();
    await mira.getByLabel(/^Caption/).fill("The label");
    await mira.getByLabel(/^Photos of case/).setInputFiles([{ name: "label.jpg", mimeType: "image/jpeg", buffer: await picture() }]);
    await expect(mira.getByRole("list", { name: /^Photos of case/ }).getByRole("listitem")).toHaveCount(1);
    await customerReads("We have your parcel.");
  });

  const caseUrl = await test.step("mira records drive and board from what the customer typed, and the chip", async () => {
    await mira.getByRole("link", { name: "Record the drive" }).click();
    const drive = dialogOf(mira, "Add a drive");
    await expect(drive.getByLabel("Part number")).toHaveValue(WISH.partNumber);
    await expect(drive.getByLabel("Serial number")).toHaveValue(WISH.serial);
    await drive.getByRole("button", { name: "Save and go on with the board" }).click();
    const board = dialogOf(mira, "Add the original board");
    await expect(board.getByLabel("Board number")).toHaveValue(WISH.boardNumber);
    await expect(board.getByLabel("Revision")).toHaveValue(REVISION);
    await board.getByRole("button", { name: "Save and go on with the chip" }).click();
    const chip = dialogOf(mira, /^Add a chip on the original/);
    await chip.getByLabel("Designator").fill("U9");
    await chip.getByLabel("Size", { exact: true }).fill("64 KiB");
    await chip.getByLabel("Supply").selectOption("3300");
    await chip.getByRole("button", { name: "Add the chip" }).click();
    await expect(mira.getByRole("dialog")).toBeHidden();
    return mira.url().replace(/\?.*$/, "");
  });

  const tomas = await at(signIn(browser, "tomas"));
  await test.step("tomas puts a donor board on the shelf and takes it for the drive: its chip is the pair", async () => {
    await tomas.getByRole("link", { name: "Shelf", exact: true }).click();
    await tomas.getByRole("button", { name: "Put a board on the shelf…" }).click();
    const dialog = tomas.getByRole("dialog");
    await dialog.getByLabel("Board number").fill(WISH.boardNumber);
    await dialog.getByLabel("Revision").fill(REVISION);
    await dialog.getByRole("button", { name: "Add a chip" }).click();
    await dialog.getByLabel("Designator").fill("U9");
    await dialog.getByLabel("Bus").selectOption("spi");
    await dialog.getByLabel("Size").fill("64 KiB");
    await dialog.getByRole("button", { name: "Put it on the shelf" }).click();
    await expect(tomas.getByRole("heading", { level: 1, name: /D-\d{4}/ })).toBeVisible();
    await tomas.goto(caseUrl);
    await tomas.getByRole("link", { name: "Drive A", exact: true }).click();
    await tomas.getByRole("button", { name: /^Take D-\d+ for this drive$/ }).click();
    await tomas.getByRole("dialog").getByRole("button", { name: "Take it" }).click();
    await expect(tomas.getByRole("dialog")).toBeHidden();
    await expect(tomas.getByRole("table", { name: "Boards of this drive and their chips" }).getByText("not paired")).toHaveCount(0);
  });

  const [image, donorsOwn] = [imageFile(folder, "U9.bin"), imageFile(folder, "donor-U9.bin")];
  await test.step("mira reads twice, tomas once in a seating of his own, and saves the donor's content", async () => {
    await openChip(mira, caseUrl, "U9");
    const [one, two, three] = copies(folder, image, ["U9_r1.bin", "U9_r2.bin", "U9_r3.bin"]);
    await upload(mira, "before", 1, [one, two]);
    await customerReads("We are reading the chip of your board.");
    await openChip(tomas, caseUrl, "U9");
    await upload(tomas, "before", 2, [three]);
    await upload(tomas, "donor", 1, copies(folder, donorsOwn, ["U9_own1.bin", "U9_own2.bin"]));
    await expect(state(tomas)).toHaveText("Waiting for approval");
    await expect(readRow(tomas, /^Read \d$/)).toHaveCount(3);
    await askForApproval(tomas, "U9 reads the same three times.");
    await customerReads("We have read the chip of your board.");
  });

  const ines = await at(signIn(browser, "ines"));
  await test.step("ines, who took no read, signs", async () => {
    await openChip(ines, caseUrl, "U9");
    await ines.getByRole("link", { name: "Open the decision sheet" }).first().click();
    await sign(ines, sha256sum(image));
    await customerReads("What we read is cleared for writing.");
  });

  await test.step("tomas writes what was handed out and reads back in two seatings", async () => {
    await openChip(tomas, caseUrl, "U9");
    await expect(state(tomas)).toHaveText("Cleared to write");
    const saving = tomas.waitForEvent("download");
    await tomas.getByRole("button", { name: /^Approved image/ }).click();
    const written = path.join(folder, "U9_written.bin");
    await (await saving).saveAs(written);
    expect(readFileSync(written).equals(readFileSync(image)), "handed out, byte for byte").toBe(true);
    await recordWrite(tomas);
    await customerReads("The donor board has been written to.");
    const [first, second] = copies(folder, written, ["U9_back1.bin", "U9_back2.bin"]);
    await upload(tomas, "after", 1, [first]);
    await upload(tomas, "after", 2, [second]);
    await expect(state(tomas)).toHaveText("Verified");
    await expect(verdict(tomas)).toContainText(`Both read-backs equal the approved image in all ${BYTES.toLocaleString("en")} bytes.`);
    await customerReads("Your drive is ready to go back.");
  });

  await test.step("the drive changes hands from tomas to mira, and she confirms", async () => {
    await tomas.goto(caseUrl);
    await tomas.getByRole("link", { name: "Drive A", exact: true }).click();
    await handOver(tomas, mira, "Drive A", { name: "Mira Hollis", role: "technician", place: "Front desk" });
  });

  await test.step("mira notes something, tests the start-up and records the return", async () => {
    await mira.goto(caseUrl);
    await mira.getByRole("button", { name: "Add a note…" }).click();
    await dialogOf(mira, "Add a note").getByLabel("Note", { exact: true }).fill("One screw of the donor board was missing; replaced.");
    await mira.getByRole("dialog").getByRole("button", { name: "Add the note" }).click();
    await expect(mira.getByRole("dialog")).toBeHidden();
    await mira.getByRole("link", { name: /^Test it/ }).click();
    await recordStartUp(mira, WISH.serial);
    await expect(mira.getByText("Spins, gets ready and reports the serial of its label; 1 attempt")).toBeVisible();
    await mira.goto(caseUrl);
    await mira.getByRole("button", { name: "Record the return…" }).click();
    await mira.getByRole("dialog").getByLabel("Carrier").fill("Hill Parcels");
    await mira.getByRole("dialog").getByRole("button", { name: "Record the return" }).click();
    await expect(mira.getByRole("dialog")).toBeHidden();
    await expect(section(mira, "Returned")).toContainText("Enclosure with its small board");
    await customerReads("Your drive is on its way back to you.");
  });

  await test.step("ines sends the summary, and the customer opens it from the mail", async () => {
    await ines.goto(caseUrl);
    await sendSummary(ines);
    await customer.goto(await summaryLink(WISH.email));
    await expect(customer.getByRole("heading", { level: 1, name: "Verification summary" })).toBeVisible();
    const text = (await customer.getByRole("main").innerText()).replace(/\s+/g, "");
    expect(text).toContain(sha256sum(image));
    await expect(customer.getByRole("main")).toContainText("it spins, gets ready and reports the serial of its label");
  });

  await test.step("ines closes the case; a correction that mira had begun before is refused", async () => {
    await mira.goto(caseUrl);
    await mira.getByRole("button", { name: "Put on hold…" }).click();
    await dialogOf(mira, "Put the case on hold").getByLabel("The question to the customer").fill("Shall the old board be kept?");
    await ines.getByRole("button", { name: "Close the case…" }).click();
    await dialogOf(ines, /^Release and close case/).getByRole("button", { name: "Close the case" }).click();
    await expect(ines.getByRole("heading", { level: 2, name: "Returned and closed" })).toBeVisible();
    expectTrouble(/^409 POST \/api\/cases\/[\w-]+\/hold$/);
    await mira.getByRole("dialog").getByRole("button", { name: "Put on hold" }).click();
    await expect(mira.getByRole("dialog").getByRole("alert")).toContainText(`Case ${ref} is closed. Reopen it first`);
    await mira.goto(caseUrl);
    for (const name of ["Put on hold…", "Correct the case…", "Record the return…", "Add a drive…"]) await expect(mira.getByRole("button", { name }), name).toHaveCount(0);
    await openChip(mira, caseUrl, "U9");
    await expect(section(mira, "Add reads")).toHaveCount(0);
    await customerReads("Your drive has gone back to you, and the case is closed.");
  });

  await test.step("rhys takes the bundle, and it checks out with and without Twinread", async () => {
    const rhys = await at(signIn(browser, "rhys"));
    await rhys.goto(caseUrl);
    const zip = await saveBundle(rhys, folder);
    const manifest = readFileSync(path.join(checkWithoutTwinread(zip, folder), "manifest-sha256.txt"), "utf8");
    // three reads and two read-backs
    expect(manifest.split("\n").filter((line) => line.startsWith(sha256sum(image)))).toHaveLength(5);
    execFileSync("npm", ["run", "--silent", "check:bundle", "--", zip], { stdio: "pipe" });
    await rhys.goto("/verify");
    await expect(rhys.locator("[data-ready]")).toBeVisible();
    await rhys.getByLabel("Case bundle or chip image").setInputFiles(zip);
    await expect(rhys.getByText(/^All in order: /)).toBeVisible();
  });
});
