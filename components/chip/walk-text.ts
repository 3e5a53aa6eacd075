import type { WalkAnswer, WalkRequest } from "./addresses.worker";
import { CANT_BE_READ, type TextLook, type WalkText } from "./file-look";

/** The addresses of a text, worked out in a thread of its own that ends with it: the page goes on meanwhile. */
export const walkText: WalkText = (file, format) => {
  const worker = new Worker(new URL("./addresses.worker.ts", import.meta.url), { type: "module" });
  return new Promise<TextLook>((resolve) => {
    const give = (problem: string) => resolve({ addresses: null, problem });
    worker.addEventListener("message", (event: MessageEvent<WalkAnswer>) => {
      const said = event.data;
      if (said.kind === "ready") worker.postMessage({ file, format } satisfies WalkRequest);
      else if (said.kind === "walked") resolve(said.look);
      else give(CANT_BE_READ);
    });
    worker.addEventListener("error", () => give("This browser could not look into the file. Reload the page and choose it again."));
  }).finally(() => worker.terminate());
};
