import type { DigestAnswer, DigestRequest } from "./digest.worker";

export interface FileDigest {
  sha256: string;
  crc32: string;
}

export interface Running<T> {
  result: Promise<T>;
  stop(): void;
}

/** Digests of a file, computed in a worker of its own that ends with it. */
export function digestFile(file: File, onProgress: (done: number) => void): Running<FileDigest> {
  const worker = new Worker(new URL("./digest.worker.ts", import.meta.url), { type: "module" });
  const result = new Promise<FileDigest>((resolve, reject) => {
    worker.addEventListener("message", (event: MessageEvent<DigestAnswer>) => {
      const said = event.data;
      if (said.kind === "ready") worker.postMessage({ file } satisfies DigestRequest);
      else if (said.kind === "progress") onProgress(said.done);
      else if (said.kind === "done") resolve({ sha256: said.sha256, crc32: said.crc32 });
      else reject(new Error("This file can't be read. It may have changed or moved since it was chosen; choose it again."));
    });
    worker.addEventListener("error", () => reject(new Error("This browser could not compute the digest. Reload the page and choose the file again.")));
  }).finally(() => worker.terminate());
  return { result, stop: () => worker.terminate() };
}
