import { countOf, listText } from "./quantity";
import { OTHER_SERIAL_TITLE, type StartUpFacts } from "./start-up";
import type { Method, TransferKind } from "./words";

/** What the sentences of the customer's summary are made from; page, PDF and mail share them. */
export interface SummaryChip {
  designator: string;
  verified: boolean;
  agreeingReads: number;
  seatings: number;
  readBacks: number;
  composite: { reads: number; seatings: number } | null;
  approvedAt: string | null;
  transferredAt: string | null;
  transferKind: TransferKind | null;
  readBy: readonly Method[];
  writtenWith: string | null;
  verifiedAt: string | null;
}
export interface SummaryDrive<C extends SummaryChip = SummaryChip> {
  letter: string;
  chips: C[];
  startUp: (StartUpFacts & { at: string }) | null;
}
export interface Summary<C extends SummaryChip = SummaryChip> {
  drives: SummaryDrive<C>[];
  twoPersonRule: boolean;
  comesBack: { items: string[]; at: string | null };
}

export function chipsOf<C extends SummaryChip>(summary: { drives: { chips: C[] }[] }): C[] {
  return summary.drives.flatMap((d) => d.chips);
}

/** How a chip was reached to read it, as recorded; nothing where nobody said. */
const HOW: Record<Method, string> = { "in-place": "on the board, with a clip", lifted: "lifted off the board", socket: "lifted, in a socket" };

export function readByText({ readBy }: Pick<SummaryChip, "readBy">): string | null {
  return readBy.length > 0 ? listText(readBy.map((method) => HOW[method])) : null;
}

function counted(n: number): string {
  return n === 1 ? "the memory chip" : n === 2 ? "both memory chips" : `all ${n} memory chips`;
}

/** The first sentences of the sheet: what is so, and nothing more than that. */
export function leadSentence(summary: Summary): string {
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

const tools = (chips: readonly SummaryChip[]) => listText([...new Set(chips.flatMap((c) => c.writtenWith ?? []))]);

/** What was done, by day and in its order; the same step on several chips is one line. `day` says a time as a day of the workshop. */
export function steps(summary: Summary, day: (iso: string) => string): Step[] {
  const person = summary.twoPersonRule ? "A second person, who had taken none of the reads," : "We";
  const kinds: { at: (c: SummaryChip) => string | null; first?: true; text: (names: string, chips: SummaryChip[]) => string }[] = [
    { at: (c) => (c.composite ? c.approvedAt : null), first: true, text: (names, chips) => `${person} looked at the votes behind the ${chips.length > 1 ? "composites" : "composite"} of ${names} and approved ${chips.length > 1 ? "them" : "it"}.` },
    { at: (c) => (c.composite ? null : c.approvedAt), first: true, text: (names, chips) => `${person} checked the reads of ${names} and approved one image${chips.length > 1 ? " for each" : ""}.` },
    { at: (c) => (c.transferKind === "write" ? c.transferredAt : null), text: (names, chips) => `We wrote the ${chips.length > 1 ? "images" : "image"} of ${names} to the donor board${tools(chips) ? ` (with ${tools(chips)})` : ""}.` },
    { at: (c) => (c.transferKind === "chip-moved" ? c.transferredAt : null), text: (names, chips) => `We took ${names} off your board and soldered ${chips.length > 1 ? "them" : "it"} to the donor board; the saved image is the safety copy.` },
    { at: (c) => c.verifiedAt, text: (names) => `We read ${names} back from the donor board; those read-backs equal the approved image.` },
  ];
  const out: Step[] = [];
  for (const kind of kinds) {
    const days = new Map<string, SummaryChip[]>();
    for (const chip of chipsOf(summary)) {
      const at = kind.at(chip);
      if (at) days.set(day(at), [...(days.get(day(at)) ?? []), chip]);
    }
    // chips take turns: an approval stands where the day's first was, all that follows from it where the day's last was
    for (const [when, chips] of days) out.push({ day: when, at: chips.map((c) => kind.at(c) ?? "").sort().at(kind.first ? 0 : -1)!, text: kind.text(listText(chips.map((c) => c.designator)), chips) });
  }
  for (const { letter, startUp } of summary.drives) {
    if (startUp) out.push({ day: day(startUp.at), at: startUp.at, text: startUpSentence(startUp, summary.drives.length > 1 ? `Drive ${letter}` : "the drive") });
  }
  return out.sort((a, b) => (a.at < b.at ? -1 : a.at > b.at ? 1 : 0));
}

/** The test's result for the customer. */
function startUpSentence({ spins, ready, serialMatches, attempts }: StartUpFacts, which: string): string {
  const did = [spins ? "it spins" : "it does not spin", ready ? "gets ready" : "does not get ready", ...(serialMatches === true ? ["reports the serial of its label"] : [])];
  const often = attempts > 1 ? `, after ${attempts} attempts` : "";
  const stop = serialMatches === false ? ` It reported another serial than its label, so we powered it off. ${OTHER_SERIAL_TITLE.replace("Stop: the drive", "Don’t power it: it")}` : "";
  return `We started ${which} with the donor board${often}: ${listText(did)}.${stop}`;
}

/** What nobody tested has to be said too; null where each drive was started. */
export function notStarted({ drives }: Pick<Summary, "drives">): string | null {
  const open = drives.filter((d) => !d.startUp && d.chips.length > 0);
  if (open.length === 0) return null;
  return drives.length === 1 ? "We have not started the drive with the donor board." : `We have not started ${listText(open.map((d) => `Drive ${d.letter}`))} with the donor board.`;
}

/** What stands about the customer's own board: only read, unless a chip was taken from it. */
export function ownBoardSentence({ chips }: Pick<SummaryDrive, "chips">): string {
  const moved = chips.filter((c) => c.transferKind === "chip-moved" && c.transferredAt).map((c) => c.designator);
  if (moved.length === 0) return "Its own board was only read, never written to.";
  return `Nothing was written to its own board; ${listText(moved)} ${moved.length > 1 ? "were" : "was"} taken off it and ${moved.length > 1 ? "are" : "is"} on the donor board now.`;
}

/** "Goes back to you" before the return is recorded, "went back" after it. */
export function comesBackSentence({ comesBack: { items, at } }: Pick<Summary, "comesBack">, day: (iso: string) => string): string {
  if (items.length === 0) return "Nothing is recorded yet.";
  return `${at ? `Sent or handed over on ${day(at)}` : "To be packed"}: ${items.join("; ")}.`;
}

/** The limits of all that is said, one sentence each. */
export function promiseLimits(summary: Summary): string[] {
  const chips = chipsOf(summary);
  const made = chips.filter((c) => c.composite);
  const started = summary.drives.length > 0 && summary.drives.every((d) => d.startUp?.ready && d.startUp.serialMatches !== false);
  return [
    `That the drive will ${started ? "keep starting" : "start or keep starting"}, or that your files can be read. The chips are one part of the drive.`,
    "That the content was sound before we read it. We show that it was moved unchanged, not that the fault left it unharmed.",
    ...(made.length > 0 ? [`That the composite of ${listText(made.map((c) => c.designator))} holds what the chip held before the fault: it holds what most reads say.`] : []),
    `Anything about parts of the board other than ${chips.length > 0 ? listText(chips.map((c) => c.designator)) : "the chips named here"}.`,
  ];
}

/** What a composite is, for somebody who has never heard of one. */
export function compositeSentences({ composite }: Pick<SummaryChip, "composite">): string | null {
  if (!composite) return null;
  return `Our ${countOf(composite.reads, "read")} of this chip differed in some places. So each bit of the image is what most of them say; nothing read it in one piece. A majority shows what repeats, not what is true: wrong bits that the chip gave most times are in this image too.`;
}

export function seatingsText(chip: SummaryChip): string {
  return `${chip.agreeingReads}, in ${countOf(chip.seatings, "seating")}`;
}
