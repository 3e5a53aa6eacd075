import { createHash } from "node:crypto";
import { readFileSync, writeFileSync } from "node:fs";
import path from "node:path";
import { expect, type Page } from "@playwright/test";
import { likeFirmware } from "../support/firmware";
import { makePair } from "./support/api";
import { readRow, recordWrite, state, upload, verdict } from "./support/chip-steps";
import { type Desk, openDesk, signIn } from "./support/desk";
import { newFolder, sha256sum } from "./support/files";
import { mailsTo } from "./support/mails";
import { expectTrouble, test } from "./support/test";

const SIZE = 65_536;
const REASON = "The chip is corroded and gives no two equal reads.";
/** where single bits of each read flip; no place twice, so that every vote is two to one */
const FLIPS = [[0x0123, 0x4567], [0x1a2b, 0x8000, 0x8001], [0x0fff, 0xc0de]];

const at = async (opened: Promise<Desk>) => (await opened).page;

async function openDialog(page: Page) {
  await page.getByRole("button", { name: "Make a composite…" }).click();
  return page.getByRole("dialog", { name: /^Make a composite of reads of U3/ });
}

test("a chip that reads differently each time goes to the donor by a vote, and every page says so", async ({ browser }) => {
  test.setTimeout(180_000);
  const folder = newFolder();
  const image = likeFirmware(Buffer.concat(Array.from({ length: SIZE / 32 }, (_, i) => createHash("sha256").update(`composite ${i}`).digest())));
  const save = (name: string, bytes: Uint8Array) => {
    const file = path.join(folder, name);
    writeFileSync(file, bytes);
    return file;
  };
  const reads = FLIPS.map((places, i) => {
    const bytes = Buffer.from(image);
    for (const place of places) bytes[place] ^= 0x08;
    return save(`r${i + 1}.bin`, bytes);
  });
  const whole = sha256sum(save("whole.bin", image));
  const email = "desk@composite.example";

  const mira = await at(signIn(browser, "mira"));
  const chip = await makePair(mira, { customer: "Composite: corroded pins", sizeBytes: SIZE, email });
  await test.step("mira takes three reads in two seatings that all differ, and a blank one", async () => {
    await mira.goto(`/chips/${chip.chipId}`);
    await upload(mira, "donor", 1, [save("own1.bin", Buffer.alloc(SIZE, 0xff)), save("own2.bin", Buffer.alloc(SIZE, 0xff))]);
    // one after the other: of two sent at once either may be stored first
    for (const [i, seating] of [1, 1, 2].entries()) await upload(mira, "before", seating, [reads[i]]);
    await upload(mira, "before", 2, [save("r4.bin", Buffer.alloc(SIZE, 0xff))]);
    await expect(state(mira)).toHaveText("Reads disagree");
    await expect(mira.getByRole("button", { name: "Make a composite…" })).toHaveCount(0);
  });

  await test.step("the three are compared side by side, and the ranges saved as CSV", async () => {
    await mira.goto(`/chips/${chip.chipId}/compare?reads=1,2,3`);
    await expect(mira.getByRole("heading", { level: 1 })).toContainText("Reads 1, 2 and 3");
    await expect(mira.getByText(/^7 bytes differ in 6 ranges, .* Read 1 stands alone in 2 bytes, Read 2 stands alone in 3 bytes and Read 3 stands alone in 2 bytes\./)).toBeVisible();
    const line = mira.getByRole("row").filter({ has: mira.getByRole("rowheader", { name: /^0x0120/ }) });
    await expect(line.getByRole("cell")).toHaveCount(3);
    await expect(line.getByRole("cell").nth(0).locator(".hex-odd")).toHaveText((image[0x123] ^ 0x08).toString(16).toUpperCase().padStart(2, "0"));
    for (const other of [1, 2]) await expect(line.getByRole("cell").nth(other).locator(".hex-other")).toHaveText(image[0x123].toString(16).toUpperCase().padStart(2, "0"));
    const saving = mira.waitForEvent("download");
    await mira.getByRole("link", { name: "Save as CSV" }).click();
    const csv = path.join(folder, "differences.csv");
    await (await saving).saveAs(csv);
    const rows = readFileSync(csv, "utf8").split("\r\n");
    expect(rows.slice(0, 3)).toEqual(["First address,Last address,Bytes,Stands alone", "0x0123,0x0123,1,Read 1", "0x0FFF,0x0FFF,1,Read 3"]);
    expect(rows).toContain("0x8000,0x8001,2,Read 2");
    // the form takes the third away again
    await mira.getByLabel("Third read").selectOption("");
    await mira.getByRole("button", { name: "Compare" }).click();
    await expect(mira.getByRole("heading", { level: 1 })).toContainText("Reads 1 and 2");
  });

  const ines = await at(signIn(browser, "ines"));
  await test.step("ines is told which read may not vote, then makes the composite with a reason", async () => {
    await ines.goto(`/chips/${chip.chipId}`);
    const dialog = await openDialog(ines);
    await expect(dialog.getByText("Three equal reads are better than any vote.")).toBeVisible();
    await expect(dialog.getByText("may not vote: it is blank")).toBeVisible();
    await dialog.getByRole("checkbox", { name: /^Read 3/ }).uncheck();
    await dialog.getByLabel("Why a composite?").fill(REASON);
    expectTrouble(/^409 POST \/api\/chips\/[\w-]+\/composite$/);
    await dialog.getByRole("button", { name: "Make the composite" }).click();
    await expect(dialog.getByRole("alert")).toContainText("Read 4 may not vote because it is blank, so only 2 reads are left of the 3 that a composite needs: take more reads.");
    await dialog.getByRole("checkbox", { name: /^Read 3/ }).check();
    await dialog.getByRole("button", { name: "Make the composite" }).click();
    await expect(dialog).toBeHidden();
    await expect(readRow(ines, "Read 5, composite")).toContainText("Made of Reads 1, 2 and 3 by majority; Read 4 had no vote");
    await expect(verdict(ines)).toContainText("Read 5 is a composite and stands for the 3 reads that were voted into it");
  });

  await test.step("she looks at the votes, and may not sign herself", async () => {
    const votes = ines.getByRole("table", { name: /^Disputed bytes/ });
    await expect(votes.getByRole("row")).toHaveCount(1 + 7);
    const byte = votes.getByRole("row").filter({ has: ines.getByRole("rowheader", { name: "0x8001" }) });
    await expect(byte).toContainText("2 of 3");
    await expect(ines.getByText("A majority shows what repeats, not what is true.").first()).toBeVisible();
    await ines.goto(`/chips/${chip.chipId}/decision`);
    await expect(ines.getByText("You made the composite Read 5 of the original U3, so you can’t approve its image.")).toBeVisible();
    await expect(ines.getByRole("button", { name: /^Approve the composite/ })).toHaveCount(0);
  });

  const bram = await at(signIn(browser, "bram"));
  await test.step("bram approves it with a written reason for each finding", async () => {
    await bram.goto(`/chips/${chip.chipId}/decision`);
    await expect(bram.getByRole("table", { name: /^Disputed bytes/ })).toBeVisible();
    for (const tick of await bram.getByRole("checkbox", { name: /^Looked at/ }).all()) await tick.check();
    for (const reason of await bram.getByLabel("Why may it be approved all the same?").all()) await reason.fill("Every disputed byte was held by two of three.");
    await bram.getByLabel("Statement").fill("Voted; no more reads can be had.");
    await bram.getByLabel("Last 8 digits of the SHA-256, typed from above").pressSequentially(whole.slice(-8));
    await bram.getByRole("button", { name: /^Approve the composite for writing to donor/ }).click();
    await expect(bram.getByRole("heading", { level: 2, name: "Signed" })).toBeVisible();
  });

  await test.step("mira hands it out, writes it and reads it back", async () => {
    await mira.goto(`/chips/${chip.chipId}`);
    await expect(state(mira)).toHaveText("Cleared to write");
    const saving = mira.waitForEvent("download");
    await mira.getByRole("button", { name: /^Approved composite/ }).click();
    const written = path.join(folder, "written.bin");
    await (await saving).saveAs(written);
    expect(readFileSync(written).equals(Buffer.from(image))).toBe(true);
    await recordWrite(mira);
    await upload(mira, "after", 1, [save("back1.bin", image)]);
    await upload(mira, "after", 2, [save("back2.bin", image)]);
    await expect(state(mira)).toHaveText("Verified");
  });

  await test.step("bench, case and log say composite", async () => {
    await mira.goto("/bench");
    await expect(mira.getByRole("row").filter({ hasText: "Composite: corroded pins" })).toContainText("composite of 3 reads");
    await mira.goto(`/cases/${chip.caseId}`);
    await expect(mira.getByRole("table", { name: "Chips of Drive A" })).toContainText("composite of 3 reads");
    await mira.getByRole("link", { name: /^Custody log, \d+ entries$/ }).click();
    await expect(mira.getByText(`Made Read 5, a composite of Read`, { exact: false }).first()).toContainText(REASON);
  });

  await test.step("the customer's summary says it in plain words", async () => {
    await bram.goto(`/cases/${chip.caseId}`);
    await bram.getByRole("button", { name: "Send summary…" }).click();
    await bram.getByRole("dialog").getByRole("button", { name: "Send it" }).click();
    await expect(bram.getByRole("dialog")).toBeHidden();
    let link: string | undefined;
    await expect.poll(() => (link = /https?:\/\/\S+\/summary\/[\w-]{43}/.exec(mailsTo(email).join("\n"))?.[0]), { timeout: 30_000 }).toBeTruthy();
    const customer = await at(openDesk(browser));
    await customer.goto(link!);
    const sheet = customer.getByRole("main");
    await expect(sheet).toContainText("The image of U3 was put together from several reads that differed");
    await expect(sheet).toContainText("This image is a composite. Our 3 reads of this chip differed in some places. So each bit of the image is what most of them say; nothing read it in one piece.");
    await expect(sheet).toContainText("Put together from3 reads, in 2 seatings");
    await expect(sheet).not.toContainText("what we read from your board");
    expect((await sheet.innerText()).replace(/\s+/g, "")).toContain(whole);
  });
});
