/**
 * What a majority of reads is worth, if errors are independent and equally likely for every bit (trade/MAJORITY.md D.2).
 * Memory cells don't keep to that exactly, so every place that shows such a number says "if errors are independent".
 * `p` is the chance of one wrong bit in one read, 0 < p < 1.
 */

/** Chance that a bit is wrong after the vote of an odd number of reads. RangeError for an even one. */
export function voteBitError(reads: number, p: number): number {
  if (!Number.isInteger(reads) || reads < 1 || reads % 2 === 0) throw new RangeError("An odd number of reads is needed.");
  let ways = 1;
  let sum = 0;
  for (let wrong = 0; wrong <= reads; wrong += 1) {
    if (wrong * 2 > reads) sum += ways * p ** wrong * (1 - p) ** (reads - wrong);
    ways = (ways * (reads - wrong)) / (wrong + 1);
  }
  return sum;
}

/** Expected number of wrong bits in an image of `bits` after the vote. */
export function expectedWrongBits(bits: number, reads: number, p: number): number {
  return bits * voteBitError(reads, p);
}

/** Chance that every bit of the voted image is right. */
export function allRightChance(bits: number, reads: number, p: number): number {
  return Math.exp(bits * Math.log1p(-voteBitError(reads, p)));
}

/** Smallest odd number of reads that leaves at most a millionth of a wrong bit to be expected; null above 99. */
export function readsNeeded(bits: number, p: number): number | null {
  for (let reads = 1; reads <= 99; reads += 2) {
    if (expectedWrongBits(bits, reads, p) <= 1e-6) return reads;
  }
  return null;
}

/** Chance that a bit is wrong although it has `margin` more votes than the other value: a margin of 1 is worth one read. */
export function bitErrorAtMargin(margin: number, p: number): number {
  return 1 / (1 + ((1 - p) / p) ** margin);
}

/** Chance that a byte is right, from the margins of its eight bits. */
export function byteConfidence(margins: readonly number[], p: number): number {
  return margins.reduce((chance, margin) => chance * (1 - bitErrorAtMargin(margin, p)), 1);
}

/** Chance that two independent reads of `bits` are identical. */
export function identicalChance(bits: number, p: number): number {
  return Math.exp(bits * Math.log((1 - p) ** 2 + p ** 2));
}

/** Chance that identical independent reads are wrong all the same. */
export function wrongThoughIdentical(bits: number, p: number, reads = 2): number {
  return -Math.expm1(-bits * Math.log1p((p / (1 - p)) ** reads));
}

/** Chance that two bad reads hold the same wrong value in one byte. */
export function sameWrongByteChance(p: number): number {
  return Math.exp(16 * Math.log1p(-p)) * Math.expm1(8 * Math.log1p((p / (1 - p)) ** 2));
}

/** p from two reads that differ in `differing` of `bits`. */
export function errorRateFrom(differing: number, bits: number): number {
  const share = (2 * differing) / bits;
  if (share >= 1) return 0.5;
  return share / (2 * (1 + Math.sqrt(1 - share)));
}

/** The largest p that two equal reads of `bits` still allow, with 95 % confidence: a tiny chip says less. */
export function errorRateAtMost(bits: number): number {
  const share = -Math.expm1(Math.log(0.05) / bits);
  return share / (1 + Math.sqrt(1 - 2 * share));
}

/** Whether `most` of `flips` in one direction is more than chance: exact two-sided sign test at one half, under 1 %. */
export function directionDecides(most: number, flips: number): boolean {
  const larger = Math.max(most, flips - most);
  let ways = 1;
  let tail = 0;
  for (let k = flips; k >= larger; k -= 1) {
    tail += ways;
    ways = (ways * k) / (flips - k + 1);
  }
  return Math.min(1, (2 * tail) / 2 ** flips) < 0.01;
}
