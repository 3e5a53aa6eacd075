import { countOf } from "@/lib/core/quantity";
import { rangeText } from "@/lib/core/strip";
import { CLASS_WORD, type StripClass } from "@/lib/core/strip-path";
import type { StripStackView, StripView } from "@/lib/views";

export const SEGMENT = 64;

export interface CellWords {
  span: string;
  says: string;
  differs: string;
}

export function cellCount(view: StripView): number {
  return view.rows[0]?.cells.length ?? 0;
}

/** The largest count of differing bytes over all lanes, per cell. */
export function differing(view: StripView): number[] {
  return Array.from({ length: cellCount(view) }, (_, i) => Math.max(0, ...view.lanes.map((lane) => lane.cells?.[i] ?? 0)));
}

/** Address of a cell's first byte; a window with fewer bytes than cells shows a byte in several of them. */
export function cellStart(view: StripView, at: number): number {
  return view.offset + Math.floor(at * view.cellBytes);
}

/** What the readout line and the slider say: "0x1F000–0x1F7FF", "all: ordinary data", "131 bytes differ". */
export function cellWords(view: StripView, at: number, sizeBytes: number): CellWords {
  const start = cellStart(view, at);
  const length = Math.max(1, Math.min(cellStart(view, at + 1), sizeBytes) - start);
  const by = new Map<string, string[]>();
  for (const row of view.rows) {
    const letter = row.cells[at] as StripClass;
    by.set(letter, [...(by.get(letter) ?? []), row.name]);
  }
  const says = [...by].map(([letter, names]) =>
    `${names.length === view.rows.length && names.length > 1 ? "all" : names.join(", ")}: ${CLASS_WORD[letter as StripClass]}`).join("; ");
  const most = differing(view)[at] ?? 0;
  const differs = most > 0 ? `${countOf(most, "byte")} ${most === 1 ? "differs" : "differ"}` : view.rows.length > 1 ? "equal" : "";
  return { span: rangeText(start, length, sizeBytes), says, differs };
}

/** The whole picture in a sentence or two, for who does not see it. */
export function stackSummary(stack: StripStackView): string {
  const lanes = stack.lanes.map((lane, i) => {
    const pair = `${stack.rows[i].name} and ${stack.rows[i + 1].name}`;
    return lane.cells === null || lane.differingBytes === 0 ? `${pair} are equal.` : `${pair} differ in ${countOf(lane.differingBytes, "byte")}, in ${countOf(lane.cells.filter((n) => n > 0).length, "cell")} of ${cellCount(stack)}.`;
  });
  return [`${countOf(stack.rows.length, "strip")} of ${cellCount(stack)} cells each.`, ...lanes].join(" ");
}

/** True when all reads hold the same class and no byte differs in this fold: then one strip stands for all. */
export function foldAgrees(view: StripView, segment: number): boolean {
  if (view.rows.length < 2) return false;
  const from = segment * SEGMENT;
  const parts = new Set(view.rows.map((row) => row.cells.slice(from, from + SEGMENT)));
  return parts.size === 1 && view.lanes.every((lane) => !(lane.cells ?? []).slice(from, from + SEGMENT).some((n) => n > 0));
}
