import { CHI_SQUARE_LEAST_BYTES, NOISE_BLOCK, NOISE_CHI_SQUARE_HIGH, NOISE_CHI_SQUARE_LOW, NOISE_ENTROPY_SLACK } from "./thresholds";

/** Shannon entropy of byte counts, bits a byte. */
export function entropyOf(counts: ArrayLike<number>, length: number): number {
  let sum = 0;
  for (let value = 0; value < 256; value += 1) {
    const n = counts[value];
    if (n > 0) sum += n * Math.log2(n);
  }
  return length === 0 ? 0 : Math.max(0, Math.log2(length) - sum / length);
}

/** Chi-square of byte counts against bytes that are all equally common, 255 degrees of freedom. */
export function chiSquareOf(counts: ArrayLike<number>, length: number): number {
  const expected = length / 256;
  let sum = 0;
  for (let value = 0; value < 256; value += 1) sum += (counts[value] - expected) ** 2 / expected;
  return sum;
}

/** Entropy to be expected of `length` random bytes, from 1 KiB on (check values A.7). */
function expectedEntropy(length: number): number {
  return 8 - 255 / (2 * length * Math.LN2);
}

/**
 * F33: whether the whole image looks like noise: chi-square of the whole in its middle 98 %, and every 4 KiB block as
 * dense as random bytes would be. A last block too short for the estimate is passed over.
 */
export function noiseLike(bytes: Uint8Array, chiSquare: number): boolean {
  if (bytes.length < CHI_SQUARE_LEAST_BYTES || chiSquare < NOISE_CHI_SQUARE_LOW || chiSquare > NOISE_CHI_SQUARE_HIGH) return false;
  const counts = new Uint32Array(256);
  for (let start = 0; start < bytes.length; start += NOISE_BLOCK) {
    const block = bytes.subarray(start, start + NOISE_BLOCK);
    if (block.length < CHI_SQUARE_LEAST_BYTES && start > 0) break;
    counts.fill(0);
    for (let i = 0; i < block.length; i += 1) counts[block[i]] += 1;
    if (entropyOf(counts, block.length) < expectedEntropy(block.length) - NOISE_ENTROPY_SLACK) return false;
  }
  return true;
}
