import { countOf, listText, readsText } from "@/lib/core/quantity";
import { approvalParts, requestParts, transferParts } from "./decision-parts";
import { plain, quiet, strong } from "./ink";
import { drawPlate } from "./plate";
import { readTable } from "./read-table";
import type { ReportBoard, ReportChip, ReportDrive, ReportFacts, ReportRead } from "./report-facts";
import { boardName, chipKind, driveName } from "./report-words";
import type { Sheet } from "./sheet";
import { backsOf, backStacks, beforeStacks, donorOf, ownStacks, type Stack } from "./stacks";
import { drawLegend, drawStack } from "./strip-drawing";

interface Place {
  drive: ReportDrive;
  board: ReportBoard;
  chip: ReportChip;
}

/** Chapter 4: each chip of an original with its pair, then donor chips that stand alone. */
export async function chips(sheet: Sheet, facts: ReportFacts): Promise<void> {
  const { record } = facts;
  const places = record.drives.flatMap((drive) => drive.boards.flatMap((board) => board.chips.map((chip) => ({ drive, board, chip }))));
  const originals = places.filter(({ board }) => board.role === "original");
  const shown = new Set<string>();
  sheet.heading(1, "The chips", { number: "4" });
  if (places.length === 0) sheet.paragraph([plain("No chip of this case is recorded yet.")]);
  else {
    sheet.paragraph([plain("Each strip shows a whole image in 256 cells; height and build carry the class, colour only repeats it. Between two strips the lane is an unbroken line where they are equal and has ticks where bytes differ.")]);
    drawLegend(sheet);
  }
  let number = 0;
  for (const place of originals) await originalChip(sheet, facts, place, `4.${(number += 1)}`, shown);
  for (const place of places) {
    const rest = place.chip.reads.filter((read) => !shown.has(read.id));
    const paired = place.board.role === "original" || originals.some(({ chip }) => chip.id === place.chip.pairedWith);
    if (paired && rest.length === 0) continue;
    number += 1;
    heading(sheet, place, `4.${number}`);
    sheet.paragraph([plain(paired ? "Further reads of this chip." : "This donor chip is not paired.")]);
    if (rest.length > 0) await reads(sheet, facts, `Reads of ${place.chip.designator}`, rest, ownStacks(place.chip), place.chip.sizeBytes, shown);
    else sheet.paragraph([quiet("Nothing read yet.")]);
  }
}

function heading(sheet: Sheet, { drive, board, chip }: Place, number: string): void {
  sheet.heading(2, `${chip.designator} of the ${board.role === "original" ? "original" : "donor"} board, ${driveName(drive)}`, { number, plate: (x, y) => drawPlate(sheet, board.role, chip.designator, x, y), keep: 90 });
  sheet.paragraph([quiet([chip.holds, chip.marking, chipKind(chip), boardName(board, true)].filter(Boolean).join("; "))]);
}

async function originalChip(sheet: Sheet, facts: ReportFacts, place: Place, number: string, shown: Set<string>): Promise<void> {
  const { record, drawing } = facts;
  const { chip } = place;
  heading(sheet, place, number);
  const state = drawing.states[chip.id];
  if (state) sheet.paragraph([strong(`${state.label}. `, { size: 10.5 }), plain(state.sentence, { size: 10.5 })], { gap: 8 });
  const before = chip.reads.filter((read) => read.stage === "before");
  if (before.length > 0) {
    sheet.heading(3, "Reads of the original", { keep: 110 });
    sheet.paragraph([quiet("Nothing is ever written to the original chip.", { size: 8.5 })]);
    await reads(sheet, facts, `Reads of ${chip.designator}`, before, beforeStacks(chip), chip.sizeBytes, shown);
    for (const read of before) if (read.derived) composite(sheet, read, read.derived);
  } else sheet.paragraph([quiet("Nothing of the original read yet.")]);

  const donor = donorOf(record, chip);
  const own = donor?.reads.filter((read) => read.stage === "donor") ?? [];
  if (donor && own.length > 0) {
    sheet.heading(3, `The own content of donor chip ${donor.designator}`, { keep: 110 });
    sheet.paragraph([quiet("Saved before anything was written to it.", { size: 8.5 })]);
    await reads(sheet, facts, `Own content of ${donor.designator}`, own, ownStacks(donor), donor.sizeBytes, shown);
  }
  requestParts(sheet, chip);
  await approvalParts(sheet, record, chip);
  await transferParts(sheet, record, chip);
  const backs = backsOf(record, chip);
  if (backs.length > 0) {
    sheet.heading(3, "Read-backs", { keep: 110 });
    await reads(sheet, facts, `Read-backs of ${chip.designator}`, backs, backStacks(record, chip), chip.sizeBytes, shown);
  }
}

async function reads(sheet: Sheet, { drawing }: ReportFacts, name: string, list: readonly ReportRead[], stacks: readonly Stack[], chipBytes: number, shown: Set<string>): Promise<void> {
  for (const stack of stacks) await drawStack(sheet, stack, chipBytes, drawing, stacks.length > 1);
  await readTable(sheet, name, list, drawing.lanes);
  for (const read of list) shown.add(read.id);
}

/** A composite says of itself what it is. */
function composite(sheet: Sheet, read: ReportRead, derived: NonNullable<ReportRead["derived"]>): void {
  sheet.heading(3, `The votes behind ${read.name}, a composite`);
  sheet.paragraph([
    strong("Derived, not read: nothing ever read this image as a whole. "),
    plain(`It was made of ${readsText([...derived.voters].sort((a, b) => a - b))} by ${derived.method}${derived.excluded.length > 0 ? `; ${readsText([...derived.excluded].sort((a, b) => a - b))} had no vote` : ""}. ${disputed(derived)} `),
    plain(derived.limit),
  ], { mark: "caution" });
  sheet.paragraph([quiet(`Who voted what for each byte stands in ${read.path.replace(/\.bin$/, "-votes.json")}.`, { size: 8.5 })]);
}

function disputed({ disputedBytes, weak, constructed }: NonNullable<ReportRead["derived"]>): string {
  const parts = [weak > 0 ? `${countOf(weak, "byte")} won by a margin of 1 or 2` : "", constructed > 0 ? `${countOf(constructed, "byte")} ${constructed === 1 ? "holds a value" : "hold values"} that no read has` : ""].filter(Boolean);
  return `${countOf(disputedBytes, "byte")} ${disputedBytes === 1 ? "was" : "were"} disputed${parts.length > 0 ? `: ${listText(parts)}` : ""}.`;
}
