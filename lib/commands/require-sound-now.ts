import { AppError } from "@/lib/errors";
import { Image, type Transaction } from "@/models";
import { type ImageState, stateNow } from "@/storage";
import { erasedText } from "./erased-image";
import { reportImage } from "./report-image";

/** A stored image was to be opened and is not what was stored, or was erased; whoever can do without it goes on. */
export class ImageNotSound extends AppError {
  constructor(readonly sha256: string, readonly state: Exclude<ImageState, "sound"> | "erased", sentence?: string) {
    super("rule-against", sentence ?? `The stored image ${sha256.slice(0, 8)}… is ${state}: it no longer matches its digest. Nothing was done with it. Tell the lead; restore it from a backup or read the chip again.`);
  }
}

/**
 * Before stored images are opened for a comparison, a strip or a judgement: nothing is ever worked out from wrong bytes and
 * kept under a right digest. With `tx` the caller holds a chain's lock, which the report has to wait for: it comes after.
 */
export async function requireSoundNow(images: readonly { sha256: string; sizeBytes: number }[], where: string, tx?: Transaction): Promise<void> {
  const erased = await erasedAmong(images.map((image) => image.sha256), tx);
  for (const { sha256, sizeBytes } of images) {
    const said = erased.get(sha256);
    if (said) throw new ImageNotSound(sha256, "erased", said);
    const state = await stateNow(sha256, sizeBytes);
    if (state === "sound") continue;
    const report = reportImage(sha256, state, where);
    if (!tx && (await report) === "sound") continue;
    report.catch((error: unknown) => console.error("could not record a damaged image:", (error as Error).message));
    throw new ImageNotSound(sha256, state);
  }
}

/** Those of them that were erased, with the sentence that says so; one question for all. */
export async function erasedAmong(sha256: readonly string[], tx?: Transaction): Promise<Map<string, string>> {
  const rows = sha256.length === 0 ? [] : await Image.findAll({
    attributes: ["sha256", "state", "erasedAt", "erasedCause"], where: { sha256: [...new Set(sha256)].map((digest) => Buffer.from(digest, "hex")), state: "erased" }, transaction: tx,
  });
  return new Map(rows.map((row) => [row.sha256.toString("hex"), erasedText(row) ?? ""]));
}
