import { listText } from "@/lib/core/quantity";
import { plain } from "./ink";
import type { ReportFacts } from "./report-facts";
import type { Sheet } from "./sheet";

/** Chapter 7: the limits of all that was said before. */
export function promises(sheet: Sheet, { record, twoPersonRule }: ReportFacts): void {
  const chips = record.drives.flatMap((drive) => drive.boards.flatMap((board) => board.chips));
  const composites = chips.filter((chip) => chip.reads.some((read) => read.derived));
  const designators = [...new Set(chips.map((chip) => chip.designator))];
  const limits = [
    "That the drive will start or keep starting, or that files can be read. The chips are one part of the drive.",
    "That the content was sound before it was read. Equal reads show that the chip gave the same bytes each time, not that those bytes are sound.",
    ...(composites.length > 0 ? [`That the ${composites.length === 1 ? "composite" : "composites"} of ${listText([...new Set(composites.map((chip) => chip.designator))])} ${composites.length === 1 ? "holds" : "hold"} what the chip held before the fault: a majority shows what repeats, not what is true.`] : []),
    "That what people recorded is so. Entries say what people recorded, and when it was recorded; times that were claimed with an upload are the uploader’s.",
    "That nothing happened outside Twinread. The log shows that what is in it was not changed, removed or put in between; its end is held by the heads that left the house in mails, summaries, seals and bundles.",
    ...(twoPersonRule ? [] : ["That two people looked: the two-person rule was switched off for at least one approval, or is switched off now."]),
    `Anything about parts of the board other than ${designators.length > 0 ? listText(designators) : "the chips named here"}.`,
  ];
  sheet.heading(1, "What this does not promise", { number: "7", keep: 150 });
  for (const limit of limits) sheet.paragraph([plain(limit)], { mark: "dash", gap: 3 });
}
