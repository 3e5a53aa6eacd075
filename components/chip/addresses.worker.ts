import type { Format } from "@/lib/core/words";
import { addressesIn, type TextLook } from "./file-look";

/** Walks one text of records apart from the page: 64 MiB of it take about a second. */
export interface WalkRequest {
  file: File;
  format: Exclude<Format, "raw">;
}
export type WalkAnswer = { kind: "ready" } | { kind: "walked"; look: TextLook } | { kind: "unreadable" };

const answer = (message: WalkAnswer) => self.postMessage(message);

self.addEventListener("message", (event: MessageEvent<WalkRequest>) => {
  const { file, format } = event.data;
  file.arrayBuffer().then(
    (bytes) => answer({ kind: "walked", look: addressesIn(format, new Uint8Array(bytes)) }),
    () => answer({ kind: "unreadable" }),
  );
});

// what was sent before this line would be lost, see digest.worker.ts
answer({ kind: "ready" });
