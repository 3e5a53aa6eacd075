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
export const PRINTED = ["labels", "job-ticket", "read-sheet", "write-ticket", "return-slip", "receipt", "erasure"] as const;
export type Printed = (typeof PRINTED)[number];

const MM_A_POINT = 25.4 / 72;
/** Advance of the mono face in em, and the height of a line. */
const ADVANCE = 0.64;
const LINE = 1.2;
const STEP = 0.5;
/** Points below which a line is rather wrapped than made smaller. */
const ONE_LINE = 6.5;
/** Points below which a word is rather broken than made smaller. */
const WHOLE_WORDS = 5.5;

/** A box on paper for one value in the mono face: millimetres and points. */
export interface Box {
  width: number;
  height: number;
  /** the size to begin with, and the smallest that may still be read */
  largest: number;
  smallest: number;
}

/**
 * The rule for long values: one line, as long as that can be read from arm's length; else the largest size, in steps of
 * half a point, at which the text wraps into its box with its words whole, if that can be read. What does not go in at the smallest size loses its middle, never
 * its ends: the ends tell two numbers apart.
 */
export function fitText(text: string, box: Box): { points: number; text: string } {
  for (let points = box.largest; points >= ONE_LINE; points -= STEP) {
    if (text.length <= room(box, points).across) return { points, text };
  }
  const longestWord = Math.max(...text.split(" ").map((word) => word.length));
  for (const whole of [true, false]) {
    for (let points = box.largest; points >= (whole ? WHOLE_WORDS : box.smallest); points -= STEP) {
      const { across, lines } = room(box, points);
      if (linesOf(text, across) <= lines && (!whole || longestWord <= across)) return { points, text };
    }
  }
  const { across, lines } = room(box, box.smallest);
  return { points: box.smallest, text: withoutMiddle(text, across * lines) };
}

/** Characters in a line of the box at this size, and lines. */
function room(box: Box, points: number): { across: number; lines: number } {
  return { across: Math.floor(box.width / (points * MM_A_POINT * ADVANCE)), lines: Math.floor(box.height / (points * MM_A_POINT * LINE) + 1e-9) };
}

/** Lines that a text takes when it breaks at spaces, and within a word only where the word alone is longer than a line. */
function linesOf(text: string, across: number): number {
  let [lines, used] = [1, 0];
  for (const word of text.split(" ")) {
    if (used > 0 && used + 1 + word.length <= across) used += 1 + word.length;
    else {
      if (used > 0) lines += 1;
      lines += Math.max(0, Math.ceil(word.length / across) - 1);
      used = word.length % across || Math.min(word.length, across);
    }
  }
  return lines;
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
