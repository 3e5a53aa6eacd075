/** Paper and label sizes in millimetres: the one source for pages, style sheets and tests. */
export const PAPERS = {
  a4: { name: "A4", width: 210, height: 297 },
  a5: { name: "A5", width: 148, height: 210 },
  a6: { name: "A6", width: 105, height: 148 },
  "62x29": { name: "Label 62 × 29 mm", width: 62, height: 29 },
  "70x37": { name: "Label 70 × 37 mm", width: 70, height: 37 },
} as const;
export type PaperName = keyof typeof PAPERS;

export const LABEL_SIZES = ["62x29", "70x37"] as const satisfies PaperName[];
export type LabelSize = (typeof LABEL_SIZES)[number];
export const WRITE_TICKET_SIZES = ["a6", "a5"] as const satisfies PaperName[];
export type WriteTicketSize = (typeof WRITE_TICKET_SIZES)[number];

/** What can be printed of a case, as the addresses spell it. */
export const PRINTED = ["labels", "job-ticket", "read-sheet", "write-ticket", "return-slip", "receipt"] as const;
export type Printed = (typeof PRINTED)[number];

const MM_A_POINT = 25.4 / 72;
/** Advance of the mono face in em, and the height of a line. */
const ADVANCE = 0.62;
const LINE = 1.2;
const STEP = 0.5;

/** A box on paper for one value in the mono face: millimetres and points. */
export interface Box {
  width: number;
  height: number;
  /** the size to begin with, and the smallest that may still be read */
  largest: number;
  smallest: number;
}

/**
 * The rule for long values: the largest size, in steps of half a point, at which the text wraps into its box. What does
 * not go in at the smallest size loses its middle, never its ends: the ends tell two numbers apart.
 */
export function fitText(text: string, box: Box): { points: number; text: string } {
  for (let points = box.largest; points >= box.smallest; points -= STEP) {
    if (text.length <= room(box, points)) return { points, text };
  }
  return { points: box.smallest, text: withoutMiddle(text, room(box, box.smallest)) };
}

/** Characters that go into the box at this size. */
function room(box: Box, points: number): number {
  const across = Math.floor(box.width / (points * MM_A_POINT * ADVANCE));
  const lines = Math.floor(box.height / (points * MM_A_POINT * LINE) + 1e-9);
  return across * lines;
}

function withoutMiddle(text: string, most: number): string {
  if (text.length <= most) return text;
  const kept = Math.max(2, most - 1);
  const head = Math.ceil(kept / 2);
  return `${text.slice(0, head)}…${text.slice(text.length - (kept - head))}`;
}

/** Several lines of prose for a box that takes `most` characters; a line break counts as `lineCharacters`. */
export function shorten(text: string, most: number, lineCharacters = 60): { text: string; shortened: boolean } {
  let used = 0;
  for (const [at, character] of [...text].entries()) {
    used += character === "\n" ? lineCharacters : 1;
    if (used > most) return { text: `${[...text].slice(0, at).join("").trimEnd()} …`, shortened: true };
  }
  return { text, shortened: false };
}

/** SHA-256 in groups of eight, all 64 digits. */
export function inGroups(digest: string, group = 8): string[] {
  return digest.match(new RegExp(`.{1,${group}}`, "g")) ?? [];
}
