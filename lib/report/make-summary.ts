import { countOf, sizeText } from "@/lib/core/quantity";
import { chipsOf, comesBackSentence, compositeSentences, leadSentence, notStarted, ownBoardSentence, promiseLimits, readByText, seatingsText, steps } from "@/lib/core/summary-words";
import type { SummaryView } from "@/lib/views";
import { code, GREEN, plain, quiet, strong } from "./ink";
import { drawPlate } from "./plate";
import { Sheet } from "./sheet";
import { drawEqual } from "./strip-drawing";

type Drive = SummaryView["drives"][number];
type Chip = Drive["chips"][number];

/** From three chips on each keeps one strip, as on the page. */
const BOTH_STRIPS_TO = 2;
const SMALL = { size: 7.75 };

/** The customer's summary as a PDF: the words, numbers and strips of the page. `link` is the page it came from. */
export async function makeSummary(summary: SummaryView, link: string, timeZone: string): Promise<Buffer> {
  const format = new Intl.DateTimeFormat("en-GB", { timeZone, day: "numeric", month: "short", year: "numeric" });
  const day = (iso: string) => format.format(new Date(iso));
  const chips = chipsOf(summary);
  const sheet = new Sheet({
    title: `Verification summary of case ${summary.caseRef}`, workshop: summary.workshop, ref: summary.caseRef, madeAt: new Date(summary.madeAt), name: "Verification summary",
    foot: `Made ${day(summary.madeAt)} for the customer of case ${summary.caseRef}`,
  });
  sheet.opening([[`Case ${summary.caseRef}`, strong(`${summary.customerName}, ${day(summary.madeAt)}`)]]);
  const verified = chips.length > 0 && chips.every((chip) => chip.verified);
  sheet.paragraph([strong(leadSentence(summary), { size: 10.5 })], { mark: verified ? "ok" : "note", gap: 6 });
  for (const drive of summary.drives) {
    sheet.paragraph([strong(`${summary.drives.length > 1 ? `Drive ${drive.letter}` : "Your drive"} `), code(drive.label), plain(`. ${ownBoardSentence(drive)}`)], { gap: 2 });
    for (const chip of drive.chips) chipPart(sheet, chip, chips.length <= BOTH_STRIPS_TO, day);
  }
  whatWasDone(sheet, summary, day);
  sheet.paragraph([strong("What comes back to you. "), plain(`${comesBackSentence(summary, day)} Keep your original board.`)], { gap: 2 });
  sheet.heading(3, "What this does not promise", { keep: 40 });
  for (const limit of promiseLimits(summary)) sheet.paragraph([plain(limit)], { mark: "dash", gap: 1 });
  howToCheck(sheet, summary, link, day);
  return sheet.finish();
}

function chipPart(sheet: Sheet, chip: Chip, both: boolean, day: (iso: string) => string): void {
  const title = `${chip.holds ?? "Memory chip"}, ${sizeText(chip.sizeBytes)}: ${chip.verified ? "Verified" : chip.stateLabel}`;
  sheet.heading(3, title, { keep: 90, plate: (x, y) => drawPlate(sheet, "original", chip.designator, x, y) });
  if (chip.cells) {
    const again = chip.transferKind === "chip-moved" ? "On the donor board" : "Read back from it";
    drawEqual(sheet, chip.cells, chip.composite ? "Put together" : "Your board", chip.verified && both ? again : null);
  }
  const composite = compositeSentences(chip);
  if (composite) sheet.paragraph([strong("This image is a composite. "), plain(composite)], { mark: "caution", gap: 2 });
  const read = readByText(chip);
  const from = chip.composite ? `put together from ${countOf(chip.composite.reads, "read")}, in ${countOf(chip.composite.seatings, "seating")}` : `${seatingsText(chip)}${read ? `; ${read}` : ""}`;
  const approved = chip.approvedAt ? `approved ${day(chip.approvedAt)}${chip.approvedBy ? `, ${chip.approvedBy}` : ""}` : "not approved yet";
  const moved = chip.transferKind === "chip-moved";
  const transferred = chip.transferredAt ? `${moved ? "moved" : "written"} ${day(chip.transferredAt)}; equal read-backs: ${chip.readBacks}` : "not written yet";
  sheet.facts([
    [chip.composite ? "The image" : "Reads that agree", [plain(from), plain(`; ${approved}`)]],
    ["On the donor", [plain(transferred, chip.verified ? { color: GREEN } : {}), plain("; CRC-32 "), code(chip.crc32?.toUpperCase() ?? "none yet", { size: 8 })]],
    ["SHA-256", chip.sha256 ? [code(chip.sha256, { size: 8 })] : [plain("none yet: no image is approved")]],
  ]);
}

function whatWasDone(sheet: Sheet, summary: SummaryView, day: (iso: string) => string): void {
  const done = steps(summary, day);
  sheet.heading(3, "What was done", { keep: 40 });
  if (done.length > 0) sheet.facts(done.map((step) => [step.day, [plain(step.text)]] as const));
  else sheet.paragraph([plain("Reading has begun; nothing is approved or written yet.")], { gap: 2 });
  const untested = notStarted(summary);
  const notes = [...(untested ? [untested] : []), ...(summary.twoPersonRule ? [] : ["In this workshop one person may both read and approve: no second person checked the image."])];
  if (notes.length > 0) sheet.paragraph([plain(notes.join(" "))], { gap: 2 });
}

function howToCheck(sheet: Sheet, summary: SummaryView, link: string, day: (iso: string) => string): void {
  const several = summary.drives.length > 1;
  sheet.space(5);
  sheet.paragraph([
    strong("Check it yourself. ", SMALL),
    quiet("Your private page must show these numbers, until ", SMALL), quiet(`${day(summary.expiresAt)}: `, SMALL), code(link, { size: 7.5, bold: true }),
    quiet(". Whoever holds the link sees the page. If somebody reads a donor chip before the drive’s first start, the SHA-256 of that file must equal the one above; drives may rewrite their chips afterwards. A “read” is the whole content of a chip, saved as a file; a “seating” is one time our clip was put on it; a “read-back” is a read of the donor chip after the transfer.", SMALL),
  ], { gap: 2 });
  sheet.paragraph([
    ...summary.drives.flatMap((drive) => [quiet(`Entry ${drive.head.seq} of the custody log${several ? ` of Drive ${drive.letter}` : ""}: `, SMALL), code(drive.head.hash, { size: 7 }), quiet(". ", SMALL)]),
    ...(summary.seal ? [quiet(`Seal ${summary.seal.number}: `, SMALL), code(summary.seal.sha256, { size: 7 }), quiet(", signed with the key ", SMALL), code(summary.seal.keyId, { size: 7 })] : []),
  ]);
}
