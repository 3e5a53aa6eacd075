import { causeText, LEAST_READS, voteExclusion } from "@/lib/core/composite-rules";
import { countOf, listText, readsText, sizeText, withCommas } from "@/lib/core/quantity";
import { type FindingCode, readName, seatingLetter } from "@/lib/core/words";
import type { ChipView, CompositeMark, ReadView, VotesView } from "@/lib/views";

export type Standing = VotesView["disputed"][number]["standing"];

export const STANDING_WORD: Record<Standing, string> = {
  firm: "firm", weak: "weak: a margin of 1 or 2", constructed: "constructed: no read holds it", undecided: "undecided",
};

/** "composite of 3 reads": beside the image wherever a chip stands in a list. */
export function compositeWords({ reads }: Pick<CompositeMark, "reads">): string {
  return `composite of ${countOf(reads, "read")}`;
}

/** "Made of Reads 1, 2 and 3 by majority", and who was left out. */
export function madeOf(derived: NonNullable<ReadView["derived"]>): string {
  const left = derived.excluded.length > 0 ? `; ${readsText([...derived.excluded].sort((a, b) => a - b))} had no vote` : "";
  return `Made of ${readsText([...derived.voters].sort((a, b) => a - b))} by majority${left}`;
}

/** What one person did for the image: "took Reads 1 and 2", "made the composite Read 5", or both. */
export function partText(reads: readonly Pick<ReadView, "number" | "derived">[]): string {
  const took = reads.filter((r) => !r.derived).map((r) => r.number);
  const made = reads.filter((r) => r.derived).map((r) => r.number);
  return listText([...(took.length > 0 ? [`took ${readsText(took)}`] : []), ...(made.length > 0 ? [`made the composite ${readsText(made)}`] : [])]);
}

/** Findings that only a look at the votes can answer. */
export const VOTE_FINDINGS: readonly FindingCode[] = ["derived", "weak-bytes", "constructed-bytes"];

export const votesAnchor = (read: Pick<ReadView, "number">) => `votes-${read.number}`;

/** Composites among the reads of the original, the counted ones first. */
export function compositesOf(reads: readonly ReadView[]): ReadView[] {
  return reads.filter((r) => r.derived !== null).sort((a, b) => Number(b.counted) - Number(a.counted) || b.number - a.number);
}

/** The composite that is the image, or null when the image is a read's. */
export function compositeBehind(reads: readonly ReadView[], sha256: string | null | undefined): ReadView | null {
  const holders = reads.filter((r) => r.stage === "before" && r.counted && r.sha256 === sha256);
  return holders.length > 0 && holders.every((r) => r.derived) ? holders[0] : null;
}

/** Reads that may be put to the vote: what came from the original chip and is stored soundly, set aside or not. */
export function candidates(chip: Pick<ChipView, "reads">): ReadView[] {
  return chip.reads.filter((r) => r.stage === "before" && !r.derived && r.imageSound);
}

/** A vote is offered where counted reads disagree and enough of them are there; whether it may be made, the server says. */
export function offersComposite(chip: Pick<ChipView, "boardRole" | "reads">): boolean {
  const counted = chip.reads.filter((r) => r.stage === "before" && r.counted);
  return chip.boardRole === "original" && new Set(counted.map((r) => r.sha256)).size > 1 && candidates(chip).length >= LEAST_READS;
}

/** What to know of a read before it is given a vote. */
export function candidateWords(read: ReadView, chip: Pick<ChipView, "sizeBytes" | "reads">): string {
  const cause = voteExclusion(read.findings);
  const same = candidates(chip).filter((r) => r.id !== read.id && r.sha256 === read.sha256).map((r) => r.number);
  return [
    `seating ${seatingLetter(read.seating)}`, read.reader,
    ...(read.sizeBytes === chip.sizeBytes ? [] : [`${sizeText(read.sizeBytes)}, not the chip’s ${sizeText(chip.sizeBytes)}`]),
    ...(same.length > 0 ? [`equals ${readsText(same)}`] : []),
    ...(read.counted ? [] : ["set aside"]),
    ...(cause ? [`may not vote: ${causeText(cause)}`] : []),
  ].join(", ");
}

/** "40 bytes disputed: 37 firm, 3 weak." */
export function countsText({ counts }: Pick<VotesView, "counts">): string {
  const parts = (["weak", "constructed", "undecided"] as const).filter((standing) => counts[standing] > 0).map((standing) => `${withCommas(counts[standing])} ${standing}`);
  return `${countOf(counts.disputed, "byte")} disputed: ${withCommas(counts.firm)} firm${parts.length > 0 ? `, ${parts.join(", ")}` : ""}.`;
}

/** Wrong bits to expect in the whole image; far below one bit the digits would only look exact. */
export function expectedText(text: string): string {
  const n = Number(text);
  if (n === 0) return "none";
  return n < 0.001 ? "fewer than 0.001" : String(Number(n.toPrecision(3)));
}

/** "1.43e-4" is "1 bit in 6,990". */
export function bitRateText(text: string): string {
  const p = Number(text);
  return p > 0 ? `1 bit in ${withCommas(Number((1 / p).toPrecision(3)))}` : "no bit";
}

/** Sources in the order of the reads' numbers, each with its place in a disputed byte's list of values. */
export function columnsOf(votes: Pick<VotesView, "sources">): { place: number; name: string; seating: string }[] {
  return votes.sources.map((source, place) => ({ place, number: source.number ?? 0, name: source.number === null ? `Source ${place + 1}` : readName("before", source.number), seating: seatingLetter(source.seating) }))
    .sort((a, b) => a.number - b.number || a.place - b.place);
}
