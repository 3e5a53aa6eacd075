import { AppError } from "@/lib/errors";
import type { Transaction } from "@/models";
import { type ImageState, stateNow } from "@/storage";
import { reportImage } from "./report-image";

/** A stored image was to be opened and is not what was stored; whoever can do without it goes on. */
export class ImageNotSound extends AppError {
  constructor(readonly sha256: string, readonly state: Exclude<ImageState, "sound">) {
    super("rule-against", `The stored image ${sha256.slice(0, 8)}… is ${state}: it no longer matches its digest. Nothing was done with it. Tell the lead; restore it from a backup or read the chip again.`);
  }
}

/**
 * Before stored images are opened for a comparison, a strip or a judgement: nothing is ever worked out from wrong bytes and
 * kept under a right digest. With `tx` the caller holds a chain's lock, which the report has to wait for: it comes after.
 */
export async function requireSoundNow(images: readonly { sha256: string; sizeBytes: number }[], where: string, tx?: Transaction): Promise<void> {
  for (const { sha256, sizeBytes } of images) {
    const state = await stateNow(sha256, sizeBytes);
    if (state === "sound") continue;
    const report = reportImage(sha256, state, where);
    if (!tx && (await report) === "sound") continue;
    report.catch((error: unknown) => console.error("could not record a damaged image:", (error as Error).message));
    throw new ImageNotSound(sha256, state);
  }
}
