import { createCellCounters } from "./cells";
import { ENGINE_VERSION } from "./engine-version";
import { endRunOf, fillMapOf } from "./facts-fill";
import { containerOf, textKindOf, type ContainerKind, type TextKind } from "./facts-kind";
import { chiSquareOf, entropyOf, noiseLike } from "./facts-noise";
import { repeatFactsOf, type RepeatFacts } from "./facts-repeats";
import { wordScores } from "./facts-words";
import { CELLS, cellsOf } from "./strip";
import { CHI_SQUARE_LEAST_BYTES, NEARLY_BLANK_SHARE } from "./thresholds";

/** What takes more than counting. Plain JSON; fractions are decimal strings. */
export interface WholeFacts {
  /** of the engine that looked; another version looks again */
  engineVersion: string;
  /** bits a byte, 6 decimals */
  entropy: string;
  /** 2 decimals; null below 1280 bytes */
  chiSquare: string | null;
  noiseLike: boolean;
  /** bits that are 1 in every byte, and bits that are 1 in some */
  alwaysOne: number;
  everOne: number;
  oneBits: number;
  /** length of the run of one value at the end, in bytes */
  endRun: number;
  repeats: RepeatFacts;
  /** W(0) to W(7) */
  wordScores: number[];
  text: TextKind | null;
  container: { kind: ContainerKind; parses: boolean } | null;
}

/** What one image shows by itself. Sizes and counts in bytes. */
export interface ImageFacts {
  sizeBytes: number;
  distinctValues: number;
  /** the most common value, the lowest of several */
  dominantByte: number;
  dominantCount: number;
  ffCount: number;
  zeroCount: number;
  /** 256 strip cells over the image's own size */
  cells: string;
  /** missing only in facts that an early engine kept */
  whole?: WholeFacts;
}

function count(bytes: Uint8Array): { facts: ImageFacts; totals: Float64Array } {
  const counters = createCellCounters({ offset: 0, length: bytes.length, cells: CELLS });
  counters.push(bytes, 0);
  const totals = new Float64Array(256);
  for (let bin = 0; bin < counters.map.bins; bin += 1) {
    const histogram = counters.histogram(bin);
    for (let value = 0; value < 256; value += 1) totals[value] += histogram[value];
  }
  const dominantCount = Math.max(...totals);
  const facts = {
    sizeBytes: bytes.length,
    distinctValues: totals.reduce((n, one) => n + (one > 0 ? 1 : 0), 0),
    dominantByte: totals.indexOf(dominantCount),
    dominantCount,
    ffCount: totals[0xff],
    zeroCount: totals[0x00],
    cells: cellsOf(counters, CELLS),
  };
  return { facts, totals };
}

const NO_REPEATS: RepeatFacts = { period: null, lines: [], short: null };

/**
 * Everything that one image can show. Linear time; beyond the image it needs 1/256 of its size. An image of one
 * value throughout has nothing more to tell. `gunzips`: gzip streams that unpack fill the file; who asks has tried it
 * (lib/engine/gunzips.ts), as these rules have no way to.
 */
export function inspectWhole(bytes: Uint8Array, gunzips = false): ImageFacts {
  const { facts, totals } = count(bytes);
  const size = bytes.length;
  let [alwaysOne, everOne, oneBits] = [size === 0 ? 0 : 0xff, 0, 0];
  for (let value = 0; value < 256; value += 1) {
    if (totals[value] === 0) continue;
    alwaysOne &= value;
    everOne |= value;
    for (let bit = 0; bit < 8; bit += 1) if ((value >> bit) & 1) oneBits += totals[value];
  }
  const chiSquare = size < CHI_SQUARE_LEAST_BYTES ? null : chiSquareOf(totals, size);
  const plain = facts.distinctValues < 2;
  const mostInformative = Math.min(size, 2 * (size - facts.ffCount), 2 * (size - facts.zeroCount));
  return {
    ...facts,
    whole: {
      engineVersion: ENGINE_VERSION,
      entropy: entropyOf(totals, size).toFixed(6),
      chiSquare: chiSquare === null ? null : chiSquare.toFixed(2),
      noiseLike: chiSquare !== null && noiseLike(bytes, chiSquare),
      alwaysOne, everOne, oneBits,
      endRun: endRunOf(bytes),
      repeats: plain ? NO_REPEATS : repeatFactsOf(bytes, fillMapOf(bytes), mostInformative),
      wordScores: plain ? new Array<number>(8).fill(0) : wordScores(bytes),
      text: plain ? null : textKindOf(bytes),
      container: containerOf(bytes, gunzips),
    },
  };
}

/** More than half of all bytes have one value. */
export function nearlyEmpty(facts: ImageFacts): boolean {
  return facts.dominantCount * 2 > facts.sizeBytes;
}

/** READ-FAULTS F04: at least 99.9 % have one value (a uniform image too). Legitimate for small parameter stores. */
export function nearlyBlank(facts: ImageFacts): boolean {
  return facts.dominantCount >= NEARLY_BLANK_SHARE * facts.sizeBytes;
}

/** Every byte has the same value. */
export function isUniform(facts: ImageFacts): boolean {
  return facts.distinctValues === 1;
}
