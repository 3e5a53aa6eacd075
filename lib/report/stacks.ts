import { countOf, listText } from "@/lib/core/quantity";
import { seatingLetter } from "@/lib/core/words";
import type { ReportCase, ReportChip, ReportRead } from "./report-facts";

export interface StackRow {
  name: string;
  note: string;
  sha256: string;
  sizeBytes: number;
}

/** Strips under each other, with a lane between each two neighbours. */
export interface Stack {
  title: string;
  rows: StackRow[];
}

/** As on screen: more than so many counted reads, and equal ones share a strip. */
const SINGLE_TO = 6;

function rowOf(reads: readonly ReportRead[]): StackRow {
  const [first] = reads;
  const notes = reads.length > 1 ? `${countOf(reads.length, "equal read")}` : first.derived ? "composite" : `seating ${seatingLetter(first.seating)}`;
  return { name: namesOf(reads), note: first.counted ? notes : "set aside", sha256: first.sha256, sizeBytes: first.sizeBytes };
}

/** "Read 1", "Read 1 to 3", "Read 1, 4 and 9 more": what fits beside a strip. */
function namesOf(reads: readonly ReportRead[]): string {
  const numbers = reads.map((read) => read.number);
  const word = reads[0].name.split(" ")[0];
  if (numbers.length > 2 && numbers.every((n, i) => n === numbers[0] + i)) return `${word} ${numbers[0]} to ${numbers.at(-1)}`;
  if (numbers.length > 3) return `${word} ${numbers[0]} and ${numbers.length - 1} more`;
  return `${word} ${listText(numbers.map(String))}`;
}

function grouped(reads: readonly ReportRead[]): ReportRead[][] {
  const groups = new Map<string, ReportRead[]>();
  for (const read of reads) groups.set(read.sha256, [...(groups.get(read.sha256) ?? []), read]);
  return [...groups.values()];
}

/** Counted reads first, then images that only reads set aside hold. */
function stackOf(title: string, reads: readonly ReportRead[]): Stack[] {
  const counted = reads.filter((read) => read.counted);
  const held = new Set(counted.map((read) => read.sha256));
  const aside = grouped(reads.filter((read) => !read.counted && !held.has(read.sha256)));
  const shown = counted.length > SINGLE_TO ? grouped(counted) : counted.map((read) => [read]);
  const rows = [...shown, ...aside].map(rowOf);
  return rows.length > 0 ? [{ title, rows }] : [];
}

/** The chip that a donor chip is paired with, the other way round; undefined without a pair. */
export function donorOf(record: ReportCase, chip: ReportChip): ReportChip | undefined {
  return record.drives.flatMap((drive) => drive.boards).flatMap((board) => board.chips).find((one) => one.pairedWith === chip.id);
}

/** Read-backs of a chip's transfers, whichever chip they were taken of. */
export function backsOf(record: ReportCase, chip: ReportChip): ReportRead[] {
  const mine = new Set(chip.transfers.map((transfer) => transfer.id));
  return record.drives.flatMap((drive) => drive.boards).flatMap((board) => board.chips).flatMap((one) => one.reads)
    .filter((read) => read.stage === "after" && read.transferId !== null && mine.has(read.transferId));
}

export const beforeStacks = (chip: ReportChip) => stackOf("Reads of the original", chip.reads.filter((read) => read.stage === "before"));
export const ownStacks = (chip: ReportChip) => stackOf("The donor chip’s own content", chip.reads.filter((read) => read.stage === "donor"));

/** For each transfer with read-backs: the approved image over them. */
export function backStacks(record: ReportCase, chip: ReportChip): Stack[] {
  return chip.transfers.flatMap((transfer, i) => {
    const approved = chip.approvals.find((one) => one.id === transfer.approval);
    const holder = approved && chip.reads.find((read) => read.sha256 === approved.sha256);
    const [backs] = stackOf("", backsOf(record, chip).filter((read) => read.transferId === transfer.id));
    if (!holder || !backs) return [];
    const image: StackRow = { name: "Approved", note: namesOf(chip.reads.filter((read) => read.stage === "before" && read.sha256 === holder.sha256)), sha256: holder.sha256, sizeBytes: holder.sizeBytes };
    const title = chip.transfers.length > 1 ? `Read-backs of transfer ${i + 1} under the approved image` : "Read-backs under the approved image";
    return [{ title, rows: [image, ...backs.rows] }];
  });
}

/** Every stack that a report of this case draws. */
export function allStacks(record: ReportCase): Stack[] {
  return record.drives.flatMap((drive) => drive.boards).flatMap((board) => board.chips)
    .flatMap((chip) => [...beforeStacks(chip), ...ownStacks(chip), ...backStacks(record, chip)]);
}

export const laneKey = (a: Pick<StackRow, "sha256">, b: Pick<StackRow, "sha256">) => `${a.sha256}:${b.sha256}`;
