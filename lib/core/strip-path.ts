/** Strips as SVG paths, one per class, so that page, PDF and mail draw the same. Pure: text in, text out. */
export type StripClass = "b" | "z" | "t" | "o" | "d" | "n";

export interface StripPath {
  cls: StripClass;
  d: string;
}

export interface CellSize {
  /** width of one cell */
  width: number;
  /** height of the strip */
  height: number;
  /** free space at the right of each cell; 0 joins neighbours of one class to one bar */
  gap?: number;
}

export const CLASS_WORD: Record<StripClass, string> = {
  b: "blank", z: "zeros", t: "text-like", o: "ordinary data", d: "dense", n: "not read",
};

/** Colours by token, for whoever draws without the style sheet. */
export const CLASS_TOKEN: Record<StripClass, string> = {
  b: "--cell-ff", z: "--cell-00", t: "--cell-text", o: "--cell-data", d: "--cell-dense", n: "--rule-2",
};

const n2 = (n: number) => String(Math.round(n * 100) / 100);
const box = (x: number, y: number, w: number, h: number) => `M${n2(x)} ${n2(y)}h${n2(w)}v${n2(h)}h-${n2(w)}z`;

/** Ones lie high, zeros lie low: build and height carry the class, colour only repeats it. */
function drawn(cls: StripClass, x: number, width: number, height: number, step: number): string {
  const line = Math.max(1, Math.round(height * 0.09));
  const bar = Math.max(1, Math.round(height * 0.15));
  switch (cls) {
    case "d":
      return box(x, 0, width, height);
    case "o": {
      const top = Math.round(height * 0.42);
      return box(x, top, width, height - top);
    }
    case "t":
      return box(x, height - bar, width, bar) + box(x, height - bar - Math.round(height * 0.28), width, bar);
    case "z":
      return box(x, height - line, width, line);
    case "b":
      return box(x, 0, width, line);
    case "n": {
      let dots = "";
      for (let at = x; at < x + width - 0.001; at += step * 2) dots += box(at, height / 2 - line / 2, Math.min(step, x + width - at), line);
      return dots;
    }
  }
}

/** One path per class that occurs, over `cells.length * width` by `height`. */
export function stripPaths(cells: string, { width, height, gap = 0 }: CellSize): StripPath[] {
  const paths = new Map<StripClass, string>();
  for (let i = 0; i < cells.length; ) {
    const cls = cells[i] as StripClass;
    let end = i + 1;
    if (gap === 0) while (end < cells.length && cells[end] === cls) end += 1;
    paths.set(cls, (paths.get(cls) ?? "") + drawn(cls, i * width, (end - i) * width - gap, height, width));
    i = end;
  }
  return [...paths].map(([cls, d]) => ({ cls, d }));
}

/** Height of a tick by the bytes that differ in its cell: under 16, under 128, more. */
function tickShare(bytes: number): number {
  return bytes < 16 ? 0.45 : bytes < 128 ? 0.72 : 1;
}

/** The lane between two reads: an unbroken line where they are equal, ticks where not. `counts` null: equal all over. */
export function lanePaths(counts: readonly number[] | null, length: number, { width, height }: CellSize): { equal: string; differ: string } {
  let equal = "";
  let differ = "";
  for (let i = 0; i < length; ) {
    if (counts && counts[i] > 0) {
      const tall = height * tickShare(counts[i]);
      differ += box(i * width, (height - tall) / 2, width * 0.76, tall);
      i += 1;
      continue;
    }
    let end = i + 1;
    while (end < length && !(counts && counts[end] > 0)) end += 1;
    equal += box(i * width, height / 2 - 0.5, (end - i) * width, 1);
    i = end;
  }
  return { equal, differ };
}
