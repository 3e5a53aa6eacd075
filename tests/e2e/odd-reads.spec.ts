import { randomBytes } from "node:crypto";
import { likeFirmware } from "../support/firmware";
import { readFileSync, writeFileSync } from "node:fs";
import path from "node:path";
import { expect, type Page } from "@playwright/test";
import { makePair } from "./support/api";
import { readRow, state, upload, verdict } from "./support/chip-steps";
import { type Desk, signIn } from "./support/desk";
import { newFolder } from "./support/files";
import { test } from "./support/test";

const SIZE = 131_072;
const FLIPPED_AT = 0x1a2b3;

interface Odd {
  what: string;
  /** what Read 2 holds instead */
  spoil(image: Buffer): Buffer;
  /** the page asks before it sends a file of another size */
  asks?: true;
  sentence: RegExp;
  finding: RegExp;
}

const ODD: Odd[] = [
  {
    what: "a flipped bit",
    spoil: (image) => {
      const read = Buffer.from(image);
      read[FLIPPED_AT] ^= 0x08;
      return read;
    },
    sentence: /^Read 2 differs in 1 byte, at 0x1A2B3: looks like single bits that flip\. Lower the clock/,
    finding: /1 byte differs/,
  },
  { what: "a blank read", spoil: (image) => Buffer.alloc(image.length, 0xff), sentence: /^Read 2 differs in [\d,]+ bytes/, finding: /All FF/ },
  { what: "a truncated read", spoil: (image) => image.subarray(0, SIZE - 4096), asks: true, sentence: /^Read 2 differs/, finding: /Ends at 0x1EFFF: 124 KiB of 128 KiB/ },
];

let mira: Desk;
let ines: Desk;
test.beforeAll(async ({ browser }) => {
  mira = await signIn(browser, "mira");
  ines = await signIn(browser, "ines");
});
test.afterAll(async () => {
  for (const desk of [mira, ines]) await desk.context.close();
});

/** The answer of the API to an approval that the page does not even offer. */
async function askAnyway(page: Page, chip: { chipId: string; donorChipId: string }, sha256: string): Promise<{ status: number; detail: string }> {
  const response = await page.request.post(`/api/chips/${chip.chipId}/approval`, {
    headers: { origin: new URL(page.url()).origin }, data: { sha256, donorChipId: chip.donorChipId, statement: "Looks fine to me.", reasons: {} },
  });
  return { status: response.status(), detail: ((await response.json()) as { detail: string }).detail };
}

for (const odd of ODD) {
  test(`${odd.what} as Read 2 is stored, judged and keeps the approval closed`, async () => {
    const page = mira.page;
    const folder = newFolder();
    const image = likeFirmware(randomBytes(SIZE));
    const save = (name: string, bytes: Buffer) => {
      const file = path.join(folder, name);
      writeFileSync(file, bytes);
      return file;
    };
    const chip = await makePair(page, { customer: `Odd reads: ${odd.what}`, sizeBytes: SIZE });
    await page.goto(`/chips/${chip.chipId}`);
    await upload(page, "donor", 1, [save("own1.bin", Buffer.alloc(SIZE, 0xff)), save("own2.bin", Buffer.alloc(SIZE, 0xff))]);
    await upload(page, "before", 1, [save("r1.bin", image)]);
    const spoiled = save("r2.bin", odd.spoil(image));
    await upload(page, "before", 1, [spoiled], { sendAnyway: odd.asks });
    await upload(page, "before", 2, [save("r3.bin", image)]);

    await expect(state(page)).toHaveText("Reads disagree");
    await expect(verdict(page).getByText(odd.sentence).first()).toBeVisible();
    await expect(readRow(page, "Read 2")).toContainText(odd.finding);
    await expect(page.getByRole("button", { name: "Ask for approval" })).toBeDisabled();

    // stored as it came, byte for byte
    const view = (await (await page.request.get(`/api/chips/${chip.chipId}`)).json()) as { reads: { id: string; stage: string; number: number; sha256: string; sizeBytes: number }[] };
    const [first, second] = [1, 2].map((number) => view.reads.find((r) => r.stage === "before" && r.number === number)!);
    const window = await page.request.get(`/api/reads/${second.id}/bytes?offset=${second.sizeBytes - 64}&length=64`);
    expect(Buffer.from(await window.body())).toEqual(readFileSync(spoiled).subarray(-64));

    await ines.page.goto(`/chips/${chip.chipId}/decision`);
    await expect(ines.page.getByText(/stands? in the way\./).first()).toBeVisible();
    const sign = ines.page.getByRole("button", { name: /^Approve for writing/ });
    await expect(sign).toBeDisabled();
    expect(await askAnyway(ines.page, chip, first.sha256)).toEqual({ status: 409, detail: expect.stringMatching(/^Reads disagree: Read 2 differs/) });
  });
}

test("three equal reads of nothing but FF are equal and stand against the approval all the same", async () => {
  const page = mira.page;
  const folder = newFolder();
  const blank = (name: string) => {
    const file = path.join(folder, name);
    writeFileSync(file, Buffer.alloc(SIZE, 0xff));
    return file;
  };
  const chip = await makePair(page, { customer: "Odd reads: blank throughout", sizeBytes: SIZE });
  await page.goto(`/chips/${chip.chipId}`);
  await upload(page, "donor", 1, [blank("own1.bin"), blank("own2.bin")]);
  await upload(page, "before", 1, [blank("r1.bin"), blank("r2.bin")]);
  await upload(page, "before", 2, [blank("r3.bin")]);
  await expect(state(page)).toHaveText("Something stands against it");
  await expect(verdict(page)).toContainText("All FF. The chip wasn't powered or the clip isn't on. Check pin 8 and read again.");
  await ines.page.goto(`/chips/${chip.chipId}/decision`);
  await expect(ines.page.getByText("All FF.").first()).toBeVisible();
  const view = (await (await page.request.get(`/api/chips/${chip.chipId}`)).json()) as { reads: { sha256: string }[] };
  expect(await askAnyway(ines.page, chip, view.reads[0].sha256)).toEqual({ status: 409, detail: expect.stringMatching(/^Something stands against it: .*All FF\./) });
});
