import { dayText } from "@/components/ui/times";
import { countOf, listText } from "@/lib/core/quantity";
import type { SummaryView } from "@/lib/views";

export type SummaryChip = SummaryView["drives"][number]["chips"][number];

export function chipsOf(summary: SummaryView): SummaryChip[] {
  return summary.drives.flatMap((d) => d.chips);
}

function counted(n: number): string {
  return n === 1 ? "the memory chip" : n === 2 ? "both memory chips" : `all ${n} memory chips`;
}

/** The first sentences of the sheet: what is so, and nothing more than that. */
export function leadSentence(summary: SummaryView): string {
  const chips = chipsOf(summary);
  const verified = chips.filter((c) => c.verified);
  const whose = summary.drives.length > 1 ? "your drives’ boards" : "your drive’s board";
  if (chips.length === 0) return "No chip of this case is recorded yet.";
  if (verified.length === 0) return `${chips.length === 1 ? "The memory chip" : "The memory chips"} of ${whose} ${chips.length === 1 ? "is" : "are"} not verified yet. Below stands how far each is.`;
  if (verified.length < chips.length) return `${verified.length} of ${chips.length} memory chips of ${whose} ${verified.length === 1 ? "is" : "are"} verified; the others are not yet. Below stands how far each is.`;
  const made = chips.filter((c) => c.composite);
  if (made.length > 0) {
    const image = chips.length === 1 ? "the image we approved" : "the images we approved";
    const where = chips.every((c) => c.transferKind === "chip-moved") ? `${chips.length === 1 ? "The memory chip" : "The memory chips"} of ${whose} now ${chips.length === 1 ? "sits" : "sit"} on a donor board. What ${chips.length === 1 ? "it holds" : "they hold"} there` : `The content of ${counted(chips.length)} of ${whose} is now on a donor board. What the donor ${chips.length === 1 ? "chip holds" : "chips hold"}`;
    return `${where} equals ${image}, byte for byte. The image of ${listText(made.map((c) => c.designator))} was put together from several reads that differed: what that means is said below.`;
  }
  if (chips.every((c) => c.transferKind === "chip-moved")) return `${chips.length === 1 ? "The memory chip" : "The memory chips"} of ${whose} now ${chips.length === 1 ? "sits" : "sit"} on a donor board. What ${chips.length === 1 ? "it holds" : "they hold"} there equals what we read before, byte for byte.`;
  return `The content of ${counted(chips.length)} of ${whose} is now on a donor board. What the donor ${chips.length === 1 ? "chip holds" : "chips hold"} equals what we read from your board, byte for byte.`;
}

export interface Step {
  day: string;
  at: string;
  text: string;
}

/** What was done, by day; the same step on several chips is one line. */
export function steps(summary: SummaryView, timeZone: string): Step[] {
  const person = summary.twoPersonRule ? "A second person, who had taken none of the reads," : "We";
  const kinds: { at: (c: SummaryChip) => string | null; text: (names: string, chips: SummaryChip[]) => string }[] = [
    { at: (c) => (c.composite ? c.approvedAt : null), text: (names, chips) => `${person} looked at the votes behind the ${chips.length > 1 ? "composites" : "composite"} of ${names} and approved ${chips.length > 1 ? "them" : "it"}.` },
    { at: (c) => (c.composite ? null : c.approvedAt), text: (names, chips) => `${person} checked the reads of ${names} and approved one image${chips.length > 1 ? " for each" : ""}.` },
    { at: (c) => (c.transferKind === "write" ? c.transferredAt : null), text: (names, chips) => `We wrote the ${chips.length > 1 ? "images" : "image"} of ${names} to the donor board.` },
    { at: (c) => (c.transferKind === "chip-moved" ? c.transferredAt : null), text: (names) => `We moved ${names} to the donor board; the saved image is the safety copy.` },
    { at: (c) => c.verifiedAt, text: (names) => `We read ${names} back from the donor board; every read-back equals the approved image.` },
  ];
  const out: Step[] = [];
  for (const kind of kinds) {
    const days = new Map<string, SummaryChip[]>();
    for (const chip of chipsOf(summary)) {
      const at = kind.at(chip);
      if (at) days.set(dayText(at, timeZone), [...(days.get(dayText(at, timeZone)) ?? []), chip]);
    }
    for (const [day, chips] of days) out.push({ day, at: chips.map((c) => kind.at(c) ?? "").sort()[0], text: kind.text(listText(chips.map((c) => c.designator)), chips) });
  }
  return out.sort((a, b) => (a.at < b.at ? -1 : a.at > b.at ? 1 : 0));
}

/** What a composite is, for somebody who has never heard of one. */
export function compositeSentences({ composite }: Pick<SummaryChip, "composite">): string | null {
  if (!composite) return null;
  return `Our ${countOf(composite.reads, "read")} of this chip differed in some places. So each bit of the image is what most of them say; nothing read it in one piece. A majority shows what repeats, not what is true: wrong bits that the chip gave most times are in this image too.`;
}

export function seatingsText(chip: SummaryChip): string {
  return `${chip.agreeingReads}, in ${countOf(chip.seatings, "seating")}`;
}
