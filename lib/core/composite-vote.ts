import type { Range } from "./words";

/** What is known of one byte on which the reads differ. */
export interface DisputedByte {
  at: number;
  /** the byte that each source holds, in the order of the sources */
  values: number[];
  /** what the vote gives, each bit by itself; an undecided bit stands as 0 and the byte as undecided */
  chosen: number;
  /** sources that hold the chosen byte */
  support: number;
  /** votes for minus votes against, bit 7 first */
  margins: number[];
  /** the smallest of the eight */
  margin: number;
  standing: Standing;
}

/** firm: margin 3 or more · weak: 1 or 2 · constructed: no source holds the chosen byte · undecided: a bit is tied */
export const STANDINGS = ["firm", "weak", "constructed", "undecided"] as const;
export type Standing = (typeof STANDINGS)[number];

export interface Vote {
  bytes: Uint8Array<ArrayBuffer>;
  disputed: DisputedByte[];
  /** more than DISPUTED_KEPT: the counts are whole, the list is not */
  truncated: boolean;
  disputedBytes: number;
  counts: Record<Standing, number>;
  /** votes that lost, over all bits */
  minorityVotes: number;
  /** bits by their margin; index is the margin, 0 to the number of sources */
  bitsAtMargin: number[];
  /** runs of disputed bytes, for a strip; kept to as many as the list */
  ranges: Range[];
}

export const DISPUTED_KEPT = 10_000;
/** Margin from which on a bit counts as firm (D.2: "3:0, 4:1, 5:2"). */
export const FIRM_MARGIN = 3;

function wordsOf(bytes: Uint8Array): Int32Array {
  const aligned = bytes.byteOffset % 4 === 0 ? bytes : bytes.slice();
  return new Int32Array(aligned.buffer, aligned.byteOffset, aligned.length >> 2);
}

/** First offset from `from` on that not all sources agree on, or the length. */
function nextDisputed(sources: readonly Uint8Array[], words: readonly Int32Array[], from: number): number {
  const [first] = sources;
  const others = sources.length;
  let i = from;
  for (; i < first.length; i += 1) {
    if (i % 4 === 0) {
      // whole words while they agree
      let word = i >> 2;
      const end = words[0].length;
      for (; word < end; word += 1) {
        const value = words[0][word];
        let k = 1;
        while (k < others && words[k][word] === value) k += 1;
        if (k < others) break;
      }
      i = word << 2;
      if (i >= first.length) return first.length;
    }
    for (let k = 1; k < others; k += 1) if (sources[k][i] !== first[i]) return i;
  }
  return first.length;
}

/** The vote on one byte. */
export function voteByte(at: number, values: number[]): DisputedByte {
  const margins: number[] = [];
  let chosen = 0;
  let undecided = false;
  for (let bit = 7; bit >= 0; bit -= 1) {
    const ones = values.reduce((n, value) => n + ((value >> bit) & 1), 0);
    const lead = 2 * ones - values.length;
    if (lead > 0) chosen |= 1 << bit;
    if (lead === 0) undecided = true;
    margins.push(Math.abs(lead));
  }
  const support = values.filter((value) => value === chosen).length;
  const margin = Math.min(...margins);
  const standing = undecided ? "undecided" : support === 0 ? "constructed" : margin < FIRM_MARGIN ? "weak" : "firm";
  return { at, values, chosen, support, margins, margin, standing };
}

/**
 * Bitwise majority of images of one length, without asking whether a vote is legitimate: makeComposite does.
 * RangeError for fewer than two images, or of different lengths. One pass, memory of one image.
 */
export function voteBits(sources: readonly Uint8Array[]): Vote {
  if (sources.length < 2 || sources.some((bytes) => bytes.length !== sources[0].length)) {
    throw new RangeError("A vote needs two or more images of one length.");
  }
  const bytes = new Uint8Array(sources[0]);
  const words = sources.map(wordsOf);
  const disputed: DisputedByte[] = [];
  const ranges: Range[] = [];
  const counts: Record<Standing, number> = { firm: 0, weak: 0, constructed: 0, undecided: 0 };
  const bitsAtMargin = new Array<number>(sources.length + 1).fill(0);
  let disputedBytes = 0;
  let minorityVotes = 0;
  for (let at = nextDisputed(sources, words, 0); at < bytes.length; at = nextDisputed(sources, words, at + 1)) {
    const one = voteByte(at, sources.map((source) => source[at]));
    bytes[at] = one.chosen;
    disputedBytes += 1;
    counts[one.standing] += 1;
    for (const margin of one.margins) {
      bitsAtMargin[margin] += 1;
      minorityVotes += (sources.length - margin) / 2;
    }
    if (disputed.length < DISPUTED_KEPT) {
      disputed.push(one);
      const open = ranges[ranges.length - 1];
      if (open && open.start + open.length === at) open.length += 1;
      else ranges.push({ start: at, length: 1 });
    }
  }
  bitsAtMargin[sources.length] += 8 * (bytes.length - disputedBytes);
  return { bytes, disputed, truncated: disputedBytes > disputed.length, disputedBytes, counts, minorityVotes, bitsAtMargin, ranges };
}
