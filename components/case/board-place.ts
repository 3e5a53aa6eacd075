import type { BoardView } from "@/lib/views";

/** The drawing's own measure. */
export const DRAWING = { width: 560, height: 250 } as const;

export interface Spot {
  x: number;
  y: number;
  width: number;
  height: number;
}

/** Where chips are drawn that nobody has placed, in the order in which they come. Our drawing, not the real board. */
export const SLOTS: readonly Spot[] = [
  { x: 54, y: 159, width: 55, height: 38 }, { x: 446, y: 156, width: 44, height: 25 }, { x: 382, y: 190, width: 44, height: 25 },
  { x: 292, y: 98, width: 44, height: 25 }, { x: 424, y: 38, width: 44, height: 25 }, { x: 62, y: 106, width: 44, height: 25 },
];

const PLACED = { width: 44, height: 25 } as const;
/** pins stick out above and below, and the board has an edge */
const EDGE = { x: 10, y: 16 } as const;
const held = (n: number, least: number, most: number) => Math.min(most, Math.max(least, n));

/** A place in thousandths as a spot of the drawing, wholly on the board. */
export function spotAt({ x, y }: { x: number; y: number }): Spot {
  const { width, height } = PLACED;
  return {
    x: Math.round(held((x / 1000) * DRAWING.width - width / 2, EDGE.x, DRAWING.width - width - EDGE.x)),
    y: Math.round(held((y / 1000) * DRAWING.height - height / 2, EDGE.y, DRAWING.height - height - EDGE.y)), width, height,
  };
}

const overlap = (a: Spot, b: Spot) => a.x < b.x + b.width + 4 && b.x < a.x + a.width + 4 && a.y < b.y + b.height + 16 && b.y < a.y + a.height + 16;

/**
 * The spot of each chip by its id: where it was placed; else the original's in their order, a donor's where its pair is,
 * others where room is left. A chip for which there is no room is left out.
 */
export function placeChips(original: BoardView | null, donor: BoardView | null): Map<string, Spot> {
  const spots = new Map<string, Spot>();
  fill(spots, original, () => undefined);
  fill(spots, donor, (pairId) => spots.get(pairId));
  return spots;
}

function fill(spots: Map<string, Spot>, board: BoardView | null, ofPair: (id: string) => Spot | undefined): void {
  const taken: Spot[] = [];
  const put = (id: string, spot: Spot) => {
    spots.set(id, spot);
    taken.push(spot);
  };
  const chips = board?.chips ?? [];
  for (const chip of chips) if (chip.place) put(chip.id, spotAt(chip.place));
  for (const chip of chips) {
    const pair = chip.place || !chip.pair ? undefined : ofPair(chip.pair.id);
    if (pair && !taken.some((other) => overlap(pair, other))) put(chip.id, pair);
  }
  for (const [i, chip] of chips.entries()) {
    if (spots.has(chip.id)) continue;
    // its own slot first, so that the others stay where they are while one is placed
    const free = [...SLOTS.slice(i, i + 1), ...SLOTS].find((slot) => !taken.some((other) => overlap(slot, other)));
    if (free) put(chip.id, free);
  }
}
