/** Lines of the hex view, from two or three windows of bytes. Pure. */
export const LINE = 16;

/** Equal in all, what stands alone, or what the others hold where one stands alone. */
export type ByteMark = "equal" | "odd" | "other";

export interface ByteLine {
  kind: "line";
  /** address of the first byte */
  at: number;
  /** each read's bytes; null past an image's end */
  bytes: readonly (readonly (number | null)[])[];
  marks: readonly (readonly ByteMark[])[];
  differing: number;
}

export interface Fold {
  kind: "fold";
  start: number;
  length: number;
}

export interface HexWindow {
  images: readonly Uint8Array[];
  /** address of the first byte of all, a multiple of 16 */
  offset: number;
  /** bytes shown; where an image ends earlier its bytes are null */
  length: number;
  /** of two reads the one that stands alone as a whole; of three each byte says so itself */
  alone: number;
}

const CONTEXT = 1;
/** folding fewer lines would take as much room as it saves */
const LEAST_FOLDED = 2;
const ALL_EQUAL: readonly ByteMark[] = ["equal", "equal", "equal"];

/** How each read's byte at one address is marked; where no two of three agree each stands alone. */
function marksOf(values: readonly (number | null)[], alone: number): readonly ByteMark[] {
  if (values.every((value) => value === values[0])) return ALL_EQUAL;
  if (values.length === 2) return values.map((_, i) => (i === alone ? "odd" : "other"));
  return values.map((value) => (values.filter((other) => other === value).length > 1 ? "other" : "odd"));
}

function lineAt({ images, length, offset, alone }: HexWindow, from: number): ByteLine {
  const count = Math.min(LINE, length - from);
  const bytes = images.map((image) => Array.from({ length: count }, (_, i) => (from + i < image.length ? image[from + i] : null)));
  const columns = Array.from({ length: count }, (_, i) => marksOf(bytes.map((one) => one[i]), alone));
  return { kind: "line", at: offset + from, bytes, marks: images.map((_, who) => columns.map((column) => column[who])), differing: columns.filter((column) => column !== ALL_EQUAL).length };
}

/** All lines of a window. */
export function hexLines(view: HexWindow): ByteLine[] {
  return Array.from({ length: Math.ceil(view.length / LINE) }, (_, i) => lineAt(view, i * LINE));
}

/**
 * Equal stretches of lines folded to one row each. Kept open: lines that differ with one line around them, the line of
 * `here`, and every fold whose start is in `opened`.
 */
export function foldLines(lines: readonly ByteLine[], { fold, here, opened }: { fold: boolean; here: number; opened: ReadonlySet<number> }): readonly (ByteLine | Fold)[] {
  if (!fold) return lines;
  const keep = lines.map((line) => line.differing > 0 || (here >= line.at && here < line.at + LINE));
  const near = keep.map((_, i) => keep.slice(Math.max(0, i - CONTEXT), i + CONTEXT + 1).some(Boolean));
  const rows: (ByteLine | Fold)[] = [];
  for (let i = 0; i < lines.length; ) {
    let end = i;
    while (end < lines.length && !near[end]) end += 1;
    const stretch = lines.slice(i, end);
    if (stretch.length >= LEAST_FOLDED && !opened.has(stretch[0].at)) {
      const last = stretch[stretch.length - 1];
      rows.push({ kind: "fold", start: stretch[0].at, length: last.at + last.bytes[0].length - stretch[0].at });
    } else rows.push(...stretch);
    if (end < lines.length) rows.push(lines[end]);
    i = end + 1;
  }
  return rows;
}

export interface Run {
  text: string;
  mark: ByteMark;
}

/** One line's bytes as text, "00 5E  3C", cut where the mark changes; 8 + 8 with a wider gap. A gap between two bytes of one mark belongs to it. */
export function runsOf(bytes: readonly (number | null)[], marks: readonly ByteMark[]): Run[] {
  const runs: Run[] = [];
  for (let i = 0; i < LINE; i += 1) {
    const gap = i === 0 ? "" : i === LINE / 2 ? "  " : " ";
    const value = i < bytes.length ? bytes[i] : null;
    const text = i >= bytes.length ? "  " : value === null ? "--" : value.toString(16).toUpperCase().padStart(2, "0");
    const mark = marks[i] ?? "equal";
    const last = runs.at(-1);
    if (last?.mark === mark) last.text += gap + text;
    else if (mark === "equal") runs.push({ text: gap + text, mark });
    else {
      if (last?.mark === "equal") last.text += gap;
      else if (gap) runs.push({ text: gap, mark: "equal" });
      runs.push({ text, mark });
    }
  }
  return runs;
}
