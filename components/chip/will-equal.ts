import { sizeText } from "@/lib/core/quantity";
import type { Stage } from "@/lib/core/words";
import type { ChipView } from "@/lib/views";
import { namesOf } from "./chip-words";

/** What a file will be equal to, known from its digest before a byte is sent; null when it equals nothing here. */
export function willEqual(chip: ChipView, stage: Stage, sha256: string): { good: boolean; words: string } | null {
  const same = chip.reads.filter((r) => r.stage === stage && r.counted && r.sha256 === sha256).map((r) => r.number);
  if (stage === "after") {
    const approvalId = chip.transfers.at(-1)?.approvalId;
    const cleared = chip.approvals.find((a) => a.id === approvalId) ?? chip.approval;
    if (cleared?.sha256 === sha256) return { good: true, words: "Will equal the approved image" };
    if (chip.reads.some((r) => r.stage === "donor" && r.sha256 === sha256)) return { good: false, words: "Equals the donor’s own content: the write changed nothing" };
  }
  if (stage === "before" && chip.reads.some((r) => r.stage === "donor" && r.sha256 === sha256)) return { good: false, words: "Equals the donor’s own content: is it the right chip?" };
  return same.length > 0 ? { good: true, words: `Will equal ${namesOf(stage, same)}` } : null;
}

/** Why a file of another size than the chip's waits, and what will become of it. */
export function sizeQuestion(fileBytes: number, chipBytes: number): string {
  if (fileBytes === 0) return "This file is empty. Take it off the list and read again.";
  const share = chipBytes / fileBytes === 2 ? "half of" : chipBytes / fileBytes === 4 ? "a quarter of" : fileBytes / chipBytes === 2 ? "twice" : fileBytes < chipBytes ? "less than" : "more than";
  return `${sizeText(fileBytes)} is ${share} this chip’s ${sizeText(chipBytes)}. It will be kept as it is and stand in the way as a read of another size. Check the kind set in the reader.`;
}
