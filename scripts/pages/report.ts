import type { Load } from "./measure";
import type { Smoothness } from "./scroll";

export interface Row {
  name: string;
  load: Load;
  mostKb?: number;
}

const MOST_SHIFT = 0.05;
const kb = (bytes: number) => (bytes / 1000).toFixed(1);
const ms = (n: number) => `${Math.round(n)} ms`;

/** A line a page with what is asked beside what was found; `kept` is about weight and CLS alone. */
export function tableOf(rows: readonly Row[], empty: Load): { text: string; lines: string[]; kept: boolean } {
  let kept = true;
  const held = (value: number, most: number) => {
    kept &&= value <= most;
    return value <= most ? "kept" : "NOT KEPT";
  };
  const lines = rows.map(({ name, load, mostKb }) => {
    const above = Math.max(0, load.js - empty.js);
    return `| ${name} | ${kb(above)} KB | ${mostKb ? `at most ${mostKb}: ${held(above / 1000, mostKb)}` : ""} | ${kb(load.css)} KB | ${kb(load.html)} KB | ${load.shifts.toFixed(3)}, ${held(load.shifts, MOST_SHIFT)} | ${ms(load.firstContent)} | ${ms(load.ready)} |`;
  });
  const head = "| page | JavaScript | asked | CSS | HTML | CLS (under 0.05) | first content (aim 1,000 ms) | ready (aim 2,000 ms) |\n|---|---|---|---|---|---|---|---|";
  return { text: `${head}\n${lines.join("\n")}`, lines, kept };
}

export function scrolled(name: string, way: string, { frames, p50, p95, worst, longestTask }: Smoothness): string {
  return `| ${name} | ${way} | ${frames} | ${p50.toFixed(1)} ms | ${p95.toFixed(1)} ms | ${worst.toFixed(1)} ms | ${longestTask.toFixed(1)} ms |`;
}
