import { FILL_BLOCK, isFill, type FillMap } from "./facts-fill";
import { ALIAS_LEAST_PAIRS, ALIAS_LEAST_SHARE, SHORT_PERIOD_LEAST_PART, SHORT_PERIOD_LEAST_SHARE, SHORT_PERIOD_MOST } from "./thresholds";

/** Pairs of bytes at one distance. Informative: not both the same fill value. */
export interface PairCount {
  informative: number;
  matches: number;
  /** pairs of neighbouring blocks of the distance's size that hold an informative pair */
  blockPairs: number;
}

export interface RepeatFacts {
  /** F05: smallest power of two at which the whole image repeats */
  period: { bytes: number; informative: number } | null;
  /** F06: address lines over which the image repeats, up to the period's own, with at least 98 % of informative pairs equal */
  lines: ({ line: number } & PairCount)[];
  /** F20: smallest distance up to 64 at which at least 98 % repeats */
  short: { bytes: number; informative: number; matches: number } | null;
}

const SAMPLES = 4096;
/** a sample with this share of unequal pairs can't come from an image within the 2 % that are allowed */
const SAMPLE_REFUSES = 0.04;

/** Looks at some pairs spread over the image; true when they rule the distance out. */
function sampleRefuses(bytes: Uint8Array, distance: number, line: boolean, exact: boolean): boolean {
  const end = bytes.length - distance;
  // odd, so that no power of two hides from it
  const step = Math.floor(end / SAMPLES) | 1;
  let informative = 0;
  let unequal = 0;
  for (let i = 0; i < end; i += step) {
    if (line && (i & distance) !== 0) continue;
    const x = bytes[i];
    if (x !== bytes[i + distance]) {
      if (exact) return true;
      unequal += 1;
      informative += 1;
    } else if (!isFill(x)) informative += 1;
  }
  return informative >= ALIAS_LEAST_PAIRS * 4 && unequal > SAMPLE_REFUSES * informative;
}

/**
 * Counts pairs (i, i + distance); with `line` only those whose address has the distance's bit clear. Null as soon
 * as more than `mostUnequal` differ.
 */
function countPairs(bytes: Uint8Array, map: FillMap, distance: number, line: boolean, mostUnequal: number): PairCount | null {
  const end = bytes.length - distance;
  let [informative, unequal, blockPairs, lastBlock] = [0, 0, 0, -1];
  for (let start = 0; start < end; start += FILL_BLOCK) {
    if (line && distance >= FILL_BLOCK && (start & distance) !== 0) continue;
    const stop = Math.min(end, start + FILL_BLOCK);
    const here = map[start / FILL_BLOCK];
    const [from, to] = [Math.floor((start + distance) / FILL_BLOCK), Math.floor((stop - 1 + distance) / FILL_BLOCK)];
    if (here !== 0 && here === map[from] && here === map[to]) continue;
    const before = informative;
    for (let i = start; i < stop; i += 1) {
      const x = bytes[i];
      if (line && (i & distance) !== 0) continue;
      if (x !== bytes[i + distance]) unequal += 1;
      else if (x === 0xff || x === 0) continue;
      informative += 1;
    }
    if (unequal > mostUnequal) return null;
    const pairOfBlocks = Math.floor(start / (2 * distance));
    if (informative > before && pairOfBlocks !== lastBlock) {
      // several pairs of small blocks lie in one block of the map
      blockPairs += Math.max(1, Math.floor(FILL_BLOCK / (2 * distance)));
      lastBlock = pairOfBlocks;
    }
  }
  return { informative, matches: informative - unequal, blockPairs };
}

function shortPeriod(bytes: Uint8Array, map: FillMap, mostInformative: number): RepeatFacts["short"] {
  const least = Math.max(ALIAS_LEAST_PAIRS, bytes.length * SHORT_PERIOD_LEAST_PART);
  const budget = (1 - SHORT_PERIOD_LEAST_SHARE) * mostInformative;
  for (let distance = 1; distance <= SHORT_PERIOD_MOST && distance < bytes.length; distance += 1) {
    if (sampleRefuses(bytes, distance, false, false)) continue;
    const count = countPairs(bytes, map, distance, false, budget);
    if (count && count.informative >= least && count.matches >= SHORT_PERIOD_LEAST_SHARE * count.informative) {
      return { bytes: distance, informative: count.informative, matches: count.matches };
    }
  }
  return null;
}

function wholePeriod(bytes: Uint8Array, map: FillMap): RepeatFacts["period"] {
  for (let distance = 1; distance < bytes.length; distance *= 2) {
    if (sampleRefuses(bytes, distance, false, true)) continue;
    const count = countPairs(bytes, map, distance, false, 0);
    if (count && count.informative >= ALIAS_LEAST_PAIRS) return { bytes: distance, informative: count.informative };
  }
  return null;
}

/**
 * F05 F06 F20. `mostInformative`: no distance can have more informative pairs (bytes that are not the commonest fill
 * count twice). Linear: a distance that most pairs contradict costs a few thousand looks.
 */
export function repeatFactsOf(bytes: Uint8Array, map: FillMap, mostInformative: number): RepeatFacts {
  const short = shortPeriod(bytes, map, mostInformative);
  if (short) return { short, period: null, lines: [] };
  const period = wholePeriod(bytes, map);
  const lines: RepeatFacts["lines"] = [];
  for (let line = 0; 2 ** line < bytes.length; line += 1) {
    const distance = 2 ** line;
    // a period repeats over every line above it
    if (period && distance > period.bytes) break;
    if (sampleRefuses(bytes, distance, true, false)) continue;
    const count = countPairs(bytes, map, distance, true, (1 - ALIAS_LEAST_SHARE) * mostInformative);
    if (count && count.informative >= ALIAS_LEAST_PAIRS && count.matches >= ALIAS_LEAST_SHARE * count.informative) lines.push({ line, ...count });
  }
  return { short, period, lines };
}
