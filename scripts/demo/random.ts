import { createHash } from "node:crypto";

/** Evenly spread numbers in [0, 1), the same for the same seed on every machine. */
export type Random = () => number;

/** xoshiro128**, whose four words of state are taken from the SHA-256 of the seed. */
export function randomFrom(seed: string): Random {
  const digest = createHash("sha256").update(seed).digest();
  let [a, b, c, d] = [0, 4, 8, 12].map((at) => digest.readUInt32LE(at));
  const rotated = (value: number, by: number) => (value << by) | (value >>> (32 - by));
  return () => {
    const result = Math.imul(rotated(Math.imul(b, 5), 7), 9);
    const shifted = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= shifted;
    d = rotated(d, 11);
    return (result >>> 0) / 4294967296;
  };
}

export const below = (random: Random, limit: number): number => Math.floor(random() * limit);
