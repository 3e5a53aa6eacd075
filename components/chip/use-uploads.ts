"use client";

import { useEffect, useState, useSyncExternalStore } from "react";
import { BROWSER_TOOLS, type Upload, UploadQueue } from "./upload-queue";

const NONE: readonly Upload[] = [];
const STEPS_AT_WORK: readonly Upload["step"][] = ["waiting", "hashing", "queued", "sending"];

/** The upload queue of one page. Leaving the page while something is on its way asks first. */
export function useUploads(onStored: (upload: Upload) => void): { queue: UploadQueue; uploads: readonly Upload[] } {
  const [queue] = useState(() => new UploadQueue(BROWSER_TOOLS));
  useEffect(() => queue.tell(onStored), [queue, onStored]);
  const uploads = useSyncExternalStore(queue.subscribe, queue.uploads, () => NONE);
  const busy = uploads.some((u) => STEPS_AT_WORK.includes(u.step));
  useEffect(() => {
    if (!busy) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener("beforeunload", ask);
    return () => window.removeEventListener("beforeunload", ask);
  }, [busy]);
  return { queue, uploads };
}
