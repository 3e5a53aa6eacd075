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

/**
 * What one most likely wants to see first: of three or more counted reads that disagree two that agree and the newest that
 * doesn't, or the first three where no two agree; else two counted that differ, else two counted, else any two.
 */
export function firstReads(reads: readonly ReadView[], stage: Stage): number[] | null {
  const all = reads.filter((r) => r.stage === stage);
  const counted = all.filter((r) => r.counted);
  const held = (read: ReadView) => counted.filter((r) => r.sha256 === read.sha256);
  const main = counted.reduce<ReadView[]>((most, read) => (held(read).length > most.length ? held(read) : most), []);
  const others = counted.filter((r) => r.sha256 !== main[0]?.sha256);
  const newest = others.at(-1);
  const chosen = !newest ? (counted.length > 1 ? counted : all).slice(0, 2) : counted.length === 2 ? counted : main.length > 1 ? [main[0], main[1], newest] : counted.slice(0, 3);
  return chosen.length > 1 ? chosen.map((r) => r.number).sort((a, b) => a - b) : null;
}

/** Which of the two stands alone: the image that fewer counted reads hold; the second when both are held by as many. */
export function standsAlone(reads: readonly ReadView[], [a, b]: readonly ReadView[]): 0 | 1 {
  const held = (sha256: string) => reads.filter((r) => r.stage === a.stage && r.counted && r.sha256 === sha256).length;
  return held(a.sha256) < held(b.sha256) ? 0 : 1;
}
