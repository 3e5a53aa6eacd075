import { sha256 } from "@noble/hashes/sha2.js";
import { crc32Hex, crc32Of, toHex } from "@/lib/core/digest";

/** Hashes one file while it streams, so that 64 MiB never lie in memory at once and the page stays quick. */
export interface DigestRequest {
  file: File;
}
export type DigestAnswer =
  | { kind: "ready" }
  | { kind: "progress"; done: number }
  | { kind: "done"; sha256: string; crc32: string }
  | { kind: "unreadable"; message: string };

const STEP_BYTES = 1_048_576;
const answer = (message: DigestAnswer) => self.postMessage(message);

self.addEventListener("message", (event: MessageEvent<DigestRequest>) => {
  void digest(event.data.file);
});

// A bundler may load a worker's parts one after the other; what was sent before this line would be lost.
answer({ kind: "ready" });

async function digest(file: File): Promise<void> {
  try {
    const hash = sha256.create();
    let crc = 0;
    let done = 0;
    let told = 0;
    const reader = file.stream().getReader();
    for (;;) {
      const { done: end, value } = await reader.read();
      if (end) break;
      hash.update(value);
      crc = crc32Of(value, crc);
      done += value.length;
      if (done - told >= STEP_BYTES) {
        told = done;
        answer({ kind: "progress", done });
      }
    }
    answer({ kind: "done", sha256: toHex(hash.digest()), crc32: crc32Hex(crc) });
  } catch (error) {
    answer({ kind: "unreadable", message: error instanceof Error ? error.message : String(error) });
  }
}
