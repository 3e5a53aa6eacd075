import { LINE } from "./hex-layout";

/** Lines of the hex view, from the bytes of two or three reads. Pure. */

/** Equal in all, what stands alone, or what the others hold where one stands alone. */
export type ByteMark = "equal" | "odd" | "other";

/** One line of one read: 16 bytes; null past an image's end. */
export type LineBytes = readonly (number | null)[];

export interface MarkedLine {
  bytes: readonly LineBytes[];
  marks: readonly (readonly ByteMark[])[];
  differing: number;
}

/** A line's bytes out of a window of the image that begins at `from`. */
export function bytesOfLine(window: Uint8Array, from: number, at: number, length: number): LineBytes {
  return Array.from({ length }, (_, i) => window[at - from + i] ?? null);
}

const ALL_EQUAL: readonly ByteMark[] = ["equal", "equal", "equal"];

/** How each read's byte at one address is marked; where no two of three agree each stands alone. */
function marksOf(values: readonly (number | null)[], alone: number): readonly ByteMark[] {
  if (values.every((value) => value === values[0])) return ALL_EQUAL;
  if (values.length === 2) return values.map((_, i) => (i === alone ? "odd" : "other"));
  return values.map((value) => (values.filter((other) => other === value).length > 1 ? "other" : "odd"));
}

/** @param alone of two reads the one that stands alone as a whole; of three each byte says so itself */
export function markLine(bytes: readonly LineBytes[], alone: number): MarkedLine {
  const columns = Array.from(bytes[0], (_, i) => marksOf(bytes.map((one) => one[i]), alone));
  return { bytes, marks: bytes.map((_, who) => columns.map((column) => column[who])), differing: columns.filter((column) => column !== ALL_EQUAL).length };
}

export interface Run {
  text: string;
  mark: ByteMark;
  /** part of what was searched for */
  found: boolean;
}

const gapBefore = (i: number) => (i === 0 ? "" : i === LINE / 2 ? "  " : " ");

/**
 * One line's bytes as text, "00 5E  3C", cut where the mark changes; 8 + 8 with a wider gap. A gap between two bytes of
 * one mark belongs to it. `found` is which bytes of the line were searched for, from and to before.
 */
export function runsOf(bytes: LineBytes, marks: readonly ByteMark[], found: readonly [number, number] = [0, 0]): Run[] {
  const runs: Run[] = [];
  for (let i = 0; i < LINE; i += 1) {
    const gap = gapBefore(i);
    const value = i < bytes.length ? bytes[i] : null;
    const text = i >= bytes.length ? "  " : value === null ? "--" : value.toString(16).toUpperCase().padStart(2, "0");
    const mark = marks[i] ?? "equal";
    const hit = i >= found[0] && i < found[1];
    const last = runs.at(-1);
    if (last?.mark === mark && last.found === hit) last.text += gap + text;
    else if (mark === "equal" && !hit) runs.push({ text: gap + text, mark, found: false });
    else {
      if (last?.mark === "equal" && !last.found) last.text += gap;
      else if (gap) runs.push({ text: gap, mark: "equal", found: false });
      runs.push({ text, mark, found: hit });
    }
  }
  return runs;
}

/** What stands in a line until its bytes are here: as wide as they will be. */
export const WAITING_LINE = Array.from({ length: LINE }, (_, i) => `${gapBefore(i)}··`).join("");

/** "00 5E 3C": upper-case pairs, 16 a line, for the clipboard. */
export function asHex(bytes: Uint8Array): string {
  const pairs = Array.from(bytes, (byte) => byte.toString(16).toUpperCase().padStart(2, "0"));
  return Array.from({ length: Math.ceil(pairs.length / LINE) }, (_, i) => pairs.slice(i * LINE, (i + 1) * LINE).join(" ")).join("\n");
}
