import { erasedText } from "@/lib/commands/erased-image";
import { readFor } from "@/lib/commands/place";
import { allow } from "@/lib/commands/refuse";
import { requireSoundImage } from "@/lib/commands/report-image";
import { findBytes, type Found, textNeedles, type Way } from "@/lib/core/find-bytes";
import { withCommas } from "@/lib/core/quantity";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { Image, type Read } from "@/models";
import { imageWindow, stateNow } from "@/storage";

/** Runs on a read whose stored image matches its digest; what is found wrong with it is written down and refused. */
async function withImage<T>(actor: Actor, readId: string, before: number, what: string, run: (sha256: string, read: Read) => Promise<T>): Promise<T> {
  allow(actor, "read.bytes");
  const { read } = await readFor(actor, readId);
  if (before >= read.sizeBytes) throw new AppError("does-not-fit", `This image ends at byte ${withCommas(read.sizeBytes)}. Choose an offset before that.`);
  const image = await Image.findByPk(read.sha256);
  const gone = image && erasedText(image);
  if (gone) throw new AppError("rule-against", gone);
  if (image?.state !== "sound") throw new AppError("rule-against", "The stored image no longer matches its digest, so its bytes aren't shown. Tell the lead.");
  const sha256 = read.sha256.toString("hex");
  if ((await stateNow(sha256, read.sizeBytes)) !== "sound") await requireSoundImage(sha256, read.sizeBytes, what);
  try {
    return await run(sha256, read);
  } catch (error) {
    // gone since it was looked at: found out, written down and refused
    await requireSoundImage(sha256, read.sizeBytes, what);
    throw error;
  }
}

/** A window of a read's bytes, for looking at; not a hand-out. */
export function readBytes(actor: Actor, readId: string, { offset, length }: { offset: number; length: number }): Promise<Buffer> {
  return withImage(actor, readId, offset, "a look at its bytes", (sha256, read) => imageWindow(sha256, offset, Math.min(length, read.sizeBytes - offset)));
}

/** Where a read holds these bytes or this text next, from an address on or before it. */
export async function findInRead(actor: Actor, readId: string, { bytes, text, from, way }: { bytes?: Uint8Array; text?: string; from: number; way: Way }): Promise<{ found: Found | null }> {
  const needles = bytes ? [{ bytes, as: "bytes" as const }] : textNeedles(text ?? "");
  return withImage(actor, readId, 0, "a search in its bytes", async (sha256, read) => ({
    found: await findBytes((offset, length) => imageWindow(sha256, offset, Math.max(0, Math.min(length, read.sizeBytes - offset))), read.sizeBytes, needles, from, way),
  }));
}
