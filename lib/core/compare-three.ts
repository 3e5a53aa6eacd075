import { countOf, listText } from "./quantity";
import { placeText } from "./strip";
import type { Range } from "./words";

/** Of three images: 0 is A, 1 is B, 2 is C. */
export type Third = 0 | 1 | 2;

/** Consecutive bytes that differ in one way: one image stands alone while the others agree, or no two agree (null). */
export interface Part extends Range {
  alone: Third | null;
}

export interface ThreeWay {
  /** maximal runs in which not all three agree, in order */
  ranges: Range[];
  /** the same bytes, cut where another image stands alone */
  parts: Part[];
  differingBytes: number;
  /** a list of ranges ended early: nothing is known past the last address that all three reach */
  truncated: boolean;
}

interface Ranges {
  ranges: readonly Range[];
  truncated: boolean;
}

const endOf = ({ start, length }: Range) => start + length;

/**
 * What three images differ in, from the ranges of their three comparisons: no byte is looked at again. Two of three
 * equal: then both comparisons with the third differ there; where no two agree all three differ.
 */
export function threeWay(ab: Ranges, ac: Ranges, bc: Ranges): ThreeWay {
  const lists = [ab, ac, bc];
  const horizon = Math.min(...lists.filter((list) => list.truncated).map((list) => endOf(list.ranges[list.ranges.length - 1])));
  const edges = [...new Set(lists.flatMap((list) => list.ranges.flatMap((range) => [range.start, endOf(range)])))].filter((at) => at < horizon).sort((a, b) => a - b);
  if (Number.isFinite(horizon)) edges.push(horizon);
  const next = [0, 0, 0];
  const parts: Part[] = [];
  const ranges: Range[] = [];
  for (let i = 0; i + 1 < edges.length; i += 1) {
    const [start, length] = [edges[i], edges[i + 1] - edges[i]];
    const [inAB, inAC, inBC] = lists.map((list, k) => {
      while (next[k] < list.ranges.length && endOf(list.ranges[next[k]]) <= start) next[k] += 1;
      return next[k] < list.ranges.length && list.ranges[next[k]].start <= start;
    });
    if (!inAB && !inAC && !inBC) continue;
    const alone = inAB && inAC && inBC ? null : inAB && inAC ? 0 : inAB && inBC ? 1 : 2;
    const [part, range] = [parts.at(-1), ranges.at(-1)];
    if (part && part.alone === alone && endOf(part) === start) part.length += length;
    else parts.push({ start, length, alone });
    if (range && endOf(range) === start) range.length += length;
    else ranges.push({ start, length });
  }
  return { ranges, parts, differingBytes: ranges.reduce((sum, range) => sum + range.length, 0), truncated: lists.some((list) => list.truncated) };
}

/** Differing bytes in which each image stands alone, and those in which no two agree. */
export function shares({ parts }: Pick<ThreeWay, "parts">): { alone: [number, number, number]; none: number } {
  const alone: [number, number, number] = [0, 0, 0];
  let none = 0;
  for (const part of parts) {
    if (part.alone === null) none += part.length;
    else alone[part.alone] += part.length;
  }
  return { alone, none };
}

/** The one image that stands alone wherever the three differ, or null. */
export function loneImage(three: Pick<ThreeWay, "parts">): Third | null {
  const [first] = three.parts;
  return first && three.parts.every((part) => part.alone === first.alone) ? first.alone : null;
}

/** "214 bytes differ in 7 ranges, all in 0x1F000–0x1FFFF. In each of them Read 2 stands alone." */
export function threeWayText(three: ThreeWay, names: readonly [string, string, string], sizeBytes: number): string {
  const { ranges, differingBytes, truncated } = three;
  if (ranges.length === 0) return `${listText(names)} are equal in all ${countOf(sizeBytes, "byte")}.`;
  const last = ranges[ranges.length - 1];
  const place = placeText(ranges[0].start, endOf(last) - 1, sizeBytes);
  const count = `${countOf(differingBytes, "byte")} ${differingBytes === 1 ? "differs" : "differ"}${differingBytes === 1 ? "" : ` in ${countOf(ranges.length, "range")}`}`;
  const head = truncated ? `More than ${count}.` : `${count}, ${place}.`;
  const lone = loneImage(three);
  if (lone !== null) return `${head} ${ranges.length === 1 ? "There" : "In each of them"} ${names[lone]} stands alone.`;
  const { alone, none } = shares(three);
  const each = names.flatMap((name, i) => (alone[i] > 0 ? [`${name} stands alone in ${countOf(alone[i], "byte")}`] : []));
  return `${head} ${listText([...each, ...(none > 0 ? [`${each.length > 0 ? "in" : "In"} ${countOf(none, "byte")} no two agree`] : [])])}.`;
}
