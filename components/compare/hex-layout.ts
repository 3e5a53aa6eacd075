import type { Range } from "@/lib/core/words";

/** Where each line and fold of an image lies, in px from the first, without any of its bytes. Pure. */
export const LINE = 16;

export interface Heights {
  /** px of a line of 16 bytes */
  line: number;
  /** px of a folded stretch */
  fold: number;
  /** px of the head that stays above the rows */
  head: number;
}

/** Consecutive lines: each drawn, or all folded to one row. */
interface Stretch {
  line: number;
  lines: number;
  folded: boolean;
  /** px of its upper edge */
  top: number;
  /** index of its first row */
  row: number;
}

export interface HexLayout {
  sizeBytes: number;
  heights: Heights;
  stretches: readonly Stretch[];
  /** px of all rows */
  height: number;
  rows: number;
}

export interface HexRow {
  kind: "line" | "fold";
  /** address of its first byte */
  at: number;
  length: number;
  /** index among all rows, from 0 */
  row: number;
  top: number;
}

export interface HexAsked {
  sizeBytes: number;
  /** where the images differ, in order */
  ranges: readonly Range[];
  /** nothing is known about addresses past the last range: lines there are never folded */
  truncated: boolean;
  fold: boolean;
  /** lines around this address stay open */
  here: number;
  /** folds that were opened by hand */
  opened: readonly Range[];
  heights: Heights;
}

const CONTEXT = 1;
/** folding fewer lines would take as much room as it saves */
const LEAST_FOLDED = 2;

/** The lines that stay open, from each to before each, in order and without overlap. */
function openLines({ sizeBytes, ranges, truncated, here, opened }: HexAsked, lines: number): [number, number][] {
  const around = ({ start, length }: Range, context: number): [number, number] =>
    [Math.max(0, Math.floor(start / LINE) - context), Math.min(lines, Math.ceil((start + length) / LINE) + context)];
  const last = ranges.at(-1);
  const open = [...ranges.map((range) => around(range, CONTEXT)), around({ start: here, length: 1 }, CONTEXT), ...opened.map((range) => around(range, 0))];
  if (truncated && last) open.push(around({ start: last.start, length: sizeBytes - last.start }, CONTEXT));
  open.sort((a, b) => a[0] - b[0]);
  const merged: [number, number][] = [];
  for (const [from, to] of open) {
    const before = merged.at(-1);
    if (before && from < before[1] + LEAST_FOLDED) before[1] = Math.max(before[1], to);
    else merged.push([from < LEAST_FOLDED ? 0 : from, to]);
  }
  const end = merged.at(-1);
  if (end && lines - end[1] < LEAST_FOLDED) end[1] = lines;
  return merged;
}

export function layOut(asked: HexAsked): HexLayout {
  const { sizeBytes, heights } = asked;
  const lines = Math.ceil(sizeBytes / LINE);
  const stretches: Stretch[] = [];
  let [top, row] = [0, 0];
  const add = (line: number, to: number, folded: boolean) => {
    if (to <= line) return;
    stretches.push({ line, lines: to - line, folded, top, row });
    top += folded ? heights.fold : (to - line) * heights.line;
    row += folded ? 1 : to - line;
  };
  let at = 0;
  for (const [from, to] of asked.fold ? openLines(asked, lines) : [[0, lines]]) {
    add(at, from, true);
    add(from, to, false);
    at = to;
  }
  add(at, lines, true);
  return { sizeBytes, heights, stretches, height: top, rows: row };
}

/** Index of the last stretch that begins at or before this; `of` says what is compared. */
function lastAtOrBefore(stretches: readonly Stretch[], value: number, of: "line" | "top"): number {
  let [low, high] = [0, stretches.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (stretches[middle][of] <= value) low = middle + 1;
    else high = middle;
  }
  return Math.max(0, low - 1);
}

/** The rows that lie at least partly between two heights. */
export function rowsBetween({ stretches, heights, sizeBytes }: HexLayout, from: number, to: number): HexRow[] {
  const rows: HexRow[] = [];
  for (let i = lastAtOrBefore(stretches, from, "top"); i < stretches.length && stretches[i].top < to; i += 1) {
    const { line, lines, folded, top, row } = stretches[i];
    if (folded) {
      if (top + heights.fold > from) rows.push({ kind: "fold", at: line * LINE, length: Math.min(sizeBytes, (line + lines) * LINE) - line * LINE, row, top });
      continue;
    }
    const first = Math.max(0, Math.floor((from - top) / heights.line));
    const end = Math.min(lines, Math.ceil((to - top) / heights.line));
    for (let k = first; k < end; k += 1) {
      const at = (line + k) * LINE;
      rows.push({ kind: "line", at, length: Math.min(LINE, sizeBytes - at), row: row + k, top: top + k * heights.line });
    }
  }
  return rows;
}

/** Upper edge of the row that holds an address, in px. */
export function topOf({ stretches, heights }: HexLayout, at: number): number {
  const stretch = stretches[lastAtOrBefore(stretches, Math.floor(at / LINE), "line")];
  if (!stretch) return 0;
  return stretch.top + (stretch.folded ? 0 : (Math.floor(at / LINE) - stretch.line) * heights.line);
}
