import { BlobReader } from "@zip.js/zip.js/lib/zip-core-custom.js";
import { digestsOf, type StreamDigests } from "@/lib/core/digest-stream";
import { openArchive } from "@/lib/core/verify/archive";
import { NotVerified, type VerifyReport } from "@/lib/core/verify/report";
import { plainTools } from "@/lib/core/verify/tools";
import { type Progress, verifyBundle } from "@/lib/core/verify/verify-bundle";

/** The whole check, away from the page so that it stays quick. It loads nothing and sends nothing. */
export interface CheckRequest {
  file: File;
  /** 64 lower-case hex digits */
  expectedKey: string | null;
}
export type CheckAnswer =
  | { kind: "ready" }
  | { kind: "progress"; progress: Progress }
  | { kind: "bundle"; report: VerifyReport }
  | { kind: "file"; digests: StreamDigests }
  | { kind: "refused"; sentence: string };

const SAY_EVERY_MS = 100;
const answer = (message: CheckAnswer) => self.postMessage(message);
let said = 0;

function say(progress: Progress): void {
  const now = performance.now();
  if (now - said < SAY_EVERY_MS) return;
  said = now;
  answer({ kind: "progress", progress });
}

self.addEventListener("message", (event: MessageEvent<CheckRequest>) => {
  void check(event.data).then(answer, (error: unknown) => answer({
    kind: "refused", sentence: error instanceof NotVerified ? error.message : "This file can't be read. It may have changed or moved since it was chosen; choose it again.",
  }));
});

// A bundler may load a worker's parts one after the other; what was sent before this line would be lost.
answer({ kind: "ready" });

async function check({ file, expectedKey }: CheckRequest): Promise<CheckAnswer> {
  const head = new Uint8Array(await file.slice(0, 2).arrayBuffer());
  const named = /\.zip$/i.test(file.name);
  if (named || (head[0] === 0x50 && head[1] === 0x4b)) {
    const { entries, faults } = await openArchive(new BlobReader(file));
    // what only begins like an archive is a file like any other
    if (named || entries.length > 0) {
      return { kind: "bundle", report: await verifyBundle({ entries, archiveFaults: faults, source: "archive", tools: plainTools, expectedKey, onProgress: say }) };
    }
  }
  return { kind: "file", digests: await digestsOf(file.stream(), (doneBytes) => say({ what: file.name, doneBytes, totalBytes: file.size })) };
}
