import { createHash } from "node:crypto";

/** Reproducible test bytes: SHA256(seed ‖ be32(0)) ‖ SHA256(seed ‖ be32(1)) ‖ …, cut to n. */
export function stream(seed: string, n: number): Uint8Array {
  const out = Buffer.alloc(Math.ceil(n / 32) * 32);
  for (let i = 0; i * 32 < n; i += 1) {
    const counter = Buffer.alloc(4);
    counter.writeUInt32BE(i);
    createHash("sha256").update(seed, "ascii").update(counter).digest().copy(out, i * 32);
  }
  return new Uint8Array(out.subarray(0, n));
}

export const sha256Hex = (bytes: Uint8Array | string) => createHash("sha256").update(bytes).digest("hex");

export const ascii = (text: string) => new TextEncoder().encode(text);

export const fill = (n: number, value: number) => new Uint8Array(n).fill(value);

/** The base image of the golden fault set: half data, half blank. */
export function goldenImage(): Uint8Array {
  const image = fill(8192, 0xff);
  image.set(stream("bench-seed-1", 3000), 0);
  image.set(ascii("UNIQUE DATA BLOCK 0001"), 4096);
  image.set(stream("bench-seed-2", 1000), 5000);
  return image;
}
