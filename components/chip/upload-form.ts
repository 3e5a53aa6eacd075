import { seatingLetter, type Stage } from "@/lib/core/words";
import type { ChipView } from "@/lib/views";
import { nameOf, readBackChipId, supplyText } from "./chip-words";

export const FIELD_NAMES = ["stage", "seating", "reader", "method", "toolVersion", "adapter", "supplyMillivolts", "clockKilohertz", "controllerHeld", "note", "format", "base", "size", "fill"] as const;
export type UploadFormValues = Record<(typeof FIELD_NAMES)[number], string>;

/** A number as it is typed, decimal or 0x and hex digits; null while it is none. */
export function numberTyped(text: string): number | null {
  const bare = text.trim();
  return /^(0x[0-9a-f]{1,8}|\d{1,10})$/i.test(bare) ? Number(bare) : null;
}

/** What goes with the files: base, size and fill belong to texts only. */
export function fieldsToSend(values: UploadFormValues): UploadFormValues {
  return values.format === "raw" ? { ...values, base: "", size: "", fill: "" } : values;
}

/** What stays the same from read to read; the supply is asked for each time, because a wrong one destroys the chip. */
export const REMEMBERED = ["reader", "method", "toolVersion", "adapter", "clockKilohertz", "controllerHeld"] as const;

export interface Content {
  stage: Stage;
  chipId: string;
  words: string;
  expectedBytes: number;
  supplyMillivolts: number | null;
}

/** Which contents can be read now: the original's, the donor's own before the first transfer, read-backs after one. */
export function contentsOf(chip: ChipView): Content[] {
  const donor = chip.boardRole === "donor" ? { id: chip.id, designator: chip.designator, sizeBytes: chip.sizeBytes } : chip.pair;
  const list: Content[] = [];
  if (chip.boardRole === "original") list.push({ stage: "before", chipId: chip.id, words: `Original ${chip.designator}`, expectedBytes: chip.sizeBytes, supplyMillivolts: chip.supplyMillivolts });
  const backId = readBackChipId(chip);
  // a donor that fits has the same chip, so the original's supply is what its warning goes by
  if (donor && !chip.transfers.some((t) => t.donorChipId === donor.id)) {
    list.push({ stage: "donor", chipId: donor.id, words: `Donor ${donor.designator}’s own content`, expectedBytes: donor.sizeBytes, supplyMillivolts: chip.supplyMillivolts });
  }
  if (backId) list.push({ stage: "after", chipId: backId, words: `Read-back of donor ${donor?.designator ?? chip.designator}`, expectedBytes: donor?.sizeBytes ?? chip.sizeBytes, supplyMillivolts: chip.supplyMillivolts });
  return list;
}

/** The content most likely read next: read-backs after a write, the donor's own once the original is read enough. */
export function likelyStage(chip: ChipView, contents: readonly Content[]): Stage {
  const wants: Stage = ["written", "failed"].includes(chip.state.state) ? "after" : chip.state.state === "ready" && !chip.donorSaved ? "donor" : "before";
  return (contents.find((c) => c.stage === wants) ?? contents[0])?.stage ?? "before";
}

/** A new seating first: it counts for more than another read in the old one. */
export function seatingOptions(chip: ChipView, stage: Stage): { value: string; label: string }[] {
  const used = new Map<number, string>();
  for (const read of chip.reads) if (read.stage === stage && !read.derived) used.set(read.seating, nameOf(read));
  const next = chip.nextSeating[stage];
  const fresh = { value: String(next), label: used.size > 0 ? `${seatingLetter(next)}, seated anew` : `${seatingLetter(next)}, the first seating` };
  return [fresh, ...[...used].filter(([seating]) => seating !== next).sort(([a], [b]) => b - a).map(([seating, name]) => ({ value: String(seating), label: `${seatingLetter(seating)}, as for ${name}` }))];
}

export const SUPPLY_OPTIONS = [
  { value: "", label: "Choose the supply that was set" },
  ...[1200, 1800, 2500, 3000, 3300, 5000].map((mv) => ({ value: String(mv), label: supplyText(mv) })),
  { value: "unknown", label: "Unknown" },
];

/** A warning when the supply set in the reader does not fit what is recorded of the chip. */
export function supplyWarning(chosen: string, chipMillivolts: number | null, designator: string): string | null {
  if (chosen === "") return null;
  if (chosen === "unknown") return "Look the supply up before you clip on: a 1.8 V chip is destroyed by 3.3 V or 5 V.";
  if (chipMillivolts === null) return `The supply of ${designator} isn't recorded. Check its data sheet: a 1.8 V chip is destroyed by 3.3 V or 5 V.`;
  const set = Number(chosen);
  if (set > chipMillivolts * 1.1) return `${designator} is a ${supplyText(chipMillivolts)} chip: ${supplyText(set)} destroys it. Set the reader to ${supplyText(chipMillivolts)}.`;
  if (set < chipMillivolts * 0.9) return `${designator} is a ${supplyText(chipMillivolts)} chip: at ${supplyText(set)} reads come out wrong. Set the reader to ${supplyText(chipMillivolts)}.`;
  return null;
}

/** What to heed before the clip goes on, by what is read. */
export function clipCaution(stage: Stage): string {
  if (stage === "before") return "Strap and mat on, power away from the board, supply checked. Never write to this chip, and never heat it before agreed reads exist.";
  if (stage === "donor") return "Strap and mat on, power away from the board, supply checked. Two equal reads save the donor's content before anything is written.";
  return "Strap and mat on, power away from the board. Take the clip off and put it on again between the read-backs.";
}
