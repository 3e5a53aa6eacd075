import type { Range, Stage } from "@/lib/core/words";
import { STAGES } from "@/lib/core/words";
import type { ReadView } from "@/lib/views";

/** Index of the range that holds this address, or the last one before it; -1 when none starts at or before it. */
export function rangeAt(ranges: readonly Range[], at: number): number {
  let [low, high] = [0, ranges.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (ranges[middle].start <= at) low = middle + 1;
    else high = middle;
  }
  return low - 1;
}

/** The next or previous range from an address, round the end; null when there is none. */
export function stepRange(ranges: readonly Range[], at: number, step: 1 | -1): Range | null {
  if (ranges.length === 0) return null;
  const here = rangeAt(ranges, at);
  if (step === 1) return ranges[(here + 1) % ranges.length];
  const inside = here >= 0 && at === ranges[here].start;
  const before = inside || here < 0 ? here - 1 : here;
  return ranges[(Math.max(before, -1) + ranges.length) % ranges.length];
}

/** "0x1F000", "1F000h" and "126976": hex with a sign of it or a letter in it, else decimal. Null when it is no address. */
export function parseAddress(text: string): number | null {
  const typed = text.trim().replace(/[\s_,]/g, "");
  const hex = /^(?:0x([0-9a-f]{1,8})|([0-9a-f]{1,8})h|(?=.*[a-f])([0-9a-f]{1,8}))$/i.exec(typed);
  if (hex) return Number.parseInt(hex[1] ?? hex[2] ?? hex[3], 16);
  return /^\d{1,9}$/.test(typed) ? Number(typed) : null;
}

/** Stages of this chip with two reads or more, in their order. */
export function stagesToCompare(reads: readonly ReadView[]): Stage[] {
  return STAGES.filter((stage) => reads.filter((r) => r.stage === stage).length > 1);
}

/** What one most likely wants to see first: two counted reads that differ, else two counted, else any two. */
export function firstPair(reads: readonly ReadView[], stage: Stage): [number, number] | null {
  const all = reads.filter((r) => r.stage === stage);
  const counted = all.filter((r) => r.counted);
  const [first] = counted;
  const other = first && counted.find((r) => r.sha256 !== first.sha256);
  const pair = other ? [first, other] : counted.length > 1 ? counted.slice(0, 2) : all.slice(0, 2);
  return pair.length === 2 ? [pair[0].number, pair[1].number] : null;
}

/** Which of the two stands alone: the image that fewer counted reads hold; the second when both are held by as many. */
export function standsAlone(reads: readonly ReadView[], a: ReadView, b: ReadView): 0 | 1 {
  const held = (sha256: string) => reads.filter((r) => r.stage === a.stage && r.counted && r.sha256 === sha256).length;
  return held(a.sha256) < held(b.sha256) ? 0 : 1;
}
