/** Lines of the hex view, from two windows of bytes. Pure. */
export const LINE = 16;

export interface ByteLine {
  kind: "line";
  /** address of the first byte */
  at: number;
  /** the two reads' bytes; null past an image's end */
  bytes: readonly [readonly (number | null)[], readonly (number | null)[]];
  differs: readonly boolean[];
  differing: number;
}

export interface Fold {
  kind: "fold";
  start: number;
  length: number;
}

export interface HexWindow {
  a: Uint8Array;
  b: Uint8Array;
  /** address of the first byte of both, a multiple of 16 */
  offset: number;
  /** bytes shown; where an image ends earlier its bytes are null */
  length: number;
}

const CONTEXT = 1;
/** folding fewer lines would take as much room as it saves */
const LEAST_FOLDED = 2;

function lineAt({ a, b, length, offset }: HexWindow, from: number): ByteLine {
  const count = Math.min(LINE, length - from);
  const pick = (bytes: Uint8Array) => Array.from({ length: count }, (_, i) => (from + i < bytes.length ? bytes[from + i] : null));
  const bytes = [pick(a), pick(b)] as const;
  const differs = bytes[0].map((value, i) => value !== bytes[1][i]);
  return { kind: "line", at: offset + from, bytes, differs, differing: differs.filter(Boolean).length };
}

/**
 * All lines of a window, equal stretches folded to one row each. Kept open: lines that differ with one line around
 * them, the line of `here`, and every fold whose start is in `opened`.
 */
export function hexRows(view: HexWindow, { fold, here, opened }: { fold: boolean; here: number; opened: ReadonlySet<number> }): (ByteLine | Fold)[] {
  const lines: ByteLine[] = [];
  for (let from = 0; from < view.length; from += LINE) lines.push(lineAt(view, from));
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
  differs: boolean;
}

/** One line's bytes as text, "00 5E  3C", cut where equal turns to differing; 8 + 8 with a wider gap. */
export function runsOf(bytes: readonly (number | null)[], differs: readonly boolean[]): Run[] {
  const runs: Run[] = [];
  for (let i = 0; i < LINE; i += 1) {
    const gap = i === 0 ? "" : i === LINE / 2 ? "  " : " ";
    const value = i < bytes.length ? bytes[i] : null;
    const text = i >= bytes.length ? "  " : value === null ? "--" : value.toString(16).toUpperCase().padStart(2, "0");
    const off = differs[i] ?? false;
    const last = runs.at(-1);
    // a gap between two differing bytes belongs to the mark, any other does not
    if (last?.differs === off) last.text += gap + text;
    else {
      if (last && !last.differs) last.text += gap;
      else if (gap) runs.push({ text: gap, differs: false });
      if (runs.at(-1)?.differs === off && !off) runs[runs.length - 1].text += text;
      else runs.push({ text, differs: off });
    }
  }
  return runs;
}
