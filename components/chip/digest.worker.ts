import { digestsOf } from "@/lib/core/digest-stream";

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
    let told = 0;
    const { sha256, crc32 } = await digestsOf(file.stream(), (done) => {
      if (done - told < STEP_BYTES) return;
      told = done;
      answer({ kind: "progress", done });
    });
    answer({ kind: "done", sha256, crc32 });
  } catch (error) {
    answer({ kind: "unreadable", message: error instanceof Error ? error.message : String(error) });
  }
}
