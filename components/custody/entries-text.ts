import { withCommas } from "@/lib/core/quantity";

/** "1 entry", "29 entries" */
export function entriesText(n: number): string {
  return `${withCommas(n)} ${n === 1 ? "entry" : "entries"}`;
}
