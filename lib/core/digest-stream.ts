import { sha256 } from "@noble/hashes/sha2.js";
import { crc32Hex, crc32Of, toHex } from "./digest";

export interface StreamDigests {
  sizeBytes: number;
  /** lower-case hex, 64 and 8 digits */
  sha256: string;
  crc32: string;
}

/** Hashes a stream to its end, in constant memory. Throws what reading it throws. */
export async function digestsOf(stream: ReadableStream<Uint8Array>, onRead: (doneBytes: number) => void): Promise<StreamDigests> {
  const hash = sha256.create();
  let [crc, done] = [0, 0];
  const reader = stream.getReader();
  for (;;) {
    const { done: end, value } = await reader.read();
    if (end) break;
    hash.update(value);
    crc = crc32Of(value, crc);
    done += value.length;
    onRead(done);
  }
  return { sizeBytes: done, sha256: toHex(hash.digest()), crc32: crc32Hex(crc) };
}
