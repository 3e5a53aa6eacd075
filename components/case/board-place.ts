import type { BoardView } from "@/lib/views";

/** Where chips are drawn on the board, in the order in which they are placed. Our drawing, not the real board. */
export const SLOTS = [
  { x: 54, y: 159, width: 55, height: 38 }, { x: 446, y: 156, width: 44, height: 25 }, { x: 382, y: 190, width: 44, height: 25 },
  { x: 292, y: 98, width: 44, height: 25 }, { x: 424, y: 38, width: 44, height: 25 }, { x: 62, y: 106, width: 44, height: 25 },
] as const;

/** The slot of each chip by its id: the original's in their order, a donor's where its pair is, others where room is left. */
export function placeChips(original: BoardView | null, donor: BoardView | null): Map<string, number> {
  const slots = new Map<string, number>();
  original?.chips.forEach((chip, i) => { if (i < SLOTS.length) slots.set(chip.id, i); });
  const taken = new Set<number>();
  for (const chip of donor?.chips ?? []) {
    const slot = chip.pair ? slots.get(chip.pair.id) : undefined;
    if (slot === undefined) continue;
    slots.set(chip.id, slot);
    taken.add(slot);
  }
  for (const chip of donor?.chips ?? []) {
    if (slots.has(chip.id)) continue;
    const free = SLOTS.findIndex((_, i) => !taken.has(i));
    if (free < 0) continue;
    slots.set(chip.id, free);
    taken.add(free);
  }
  return slots;
}
