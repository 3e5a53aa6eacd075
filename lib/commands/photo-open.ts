import type { Readable } from "node:stream";
import { safeName } from "@/lib/core/bundle-layout";
import { type PhotoType, type ReducedEdge, TYPE_ENDING } from "@/lib/core/photo-kind";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { Photo } from "@/models";
import { pathOfImage, readReduced, verifiedStream, writeReduced } from "@/storage";
import { refuseErased } from "./erased-image";
import { reduceAgain } from "./photo-look";
import { photoPlaceFor } from "./photo-place";
import { allow, notFound } from "./refuse";
import { reportImage, requireSoundImage } from "./report-image";

/** The photo's row, for who may see what it is of. */
async function photoFor(actor: Actor, id: string): Promise<Photo> {
  allow(actor, "photo.read");
  const row = await Photo.findByPk(id);
  if (!row) throw notFound("photo");
  await photoPlaceFor(actor, row.subjectType, row.subjectId).catch((error: unknown) => {
    throw error instanceof AppError && error.code === "not-found" ? notFound("photo") : error;
  });
  return row;
}

export interface OpenPhoto {
  sha256: string;
  sizeBytes: number;
  mediaType: string;
  /** a name of ours, never the sender's */
  fileName: string;
}

/** "photo-9f86d081.jpg": told apart by the digest, so that two of one thing never share a name. */
const nameOf = (row: Photo, ending: string) => `${safeName(row.subjectType)}-${row.kind}-${row.sha256.toString("hex").slice(0, 8)}.${ending}`;

/** The original as it came, checked while it flows: on a mismatch the stream breaks before its end, and that is written down. */
export async function openOriginal(actor: Actor, id: string): Promise<OpenPhoto & { stream: Readable }> {
  const row = await photoFor(actor, id);
  const sha256 = row.sha256.toString("hex");
  await requireSoundImage(sha256, row.sizeBytes, "photo");
  const stream = verifiedStream(sha256);
  stream.once("error", () => {
    void reportImage(sha256, "damaged", "photo").catch((error: unknown) => console.error("could not record a damaged image:", error));
  });
  return { sha256, sizeBytes: row.sizeBytes, mediaType: row.mediaType, fileName: nameOf(row, TYPE_ENDING[row.mediaType as PhotoType] ?? "bin"), stream };
}

/** The copy for the screen: upright, at most `edge` pixels, without any of the original's metadata. Made again when it is not there. */
export async function openReduced(actor: Actor, id: string, edge: ReducedEdge): Promise<{ bytes: Buffer; fileName: string }> {
  const row = await photoFor(actor, id);
  if (row.kind === "document") throw new AppError("does-not-fit", "A document has no reduced copy. Download it as it came.");
  return { bytes: await reducedOf(row.sha256.toString("hex"), row.sizeBytes, edge), fileName: nameOf(row, "jpg") };
}

/** For whoever has asked who may see it: the copy from the folder of copies, or made from the original once it was read whole. */
export async function reducedOf(sha256: string, sizeBytes: number, edge: ReducedEdge): Promise<Buffer> {
  await refuseErased(sha256);
  const kept = await readReduced(sha256, edge);
  if (kept) return kept;
  await requireSoundImage(sha256, sizeBytes, "photo");
  const made = await reduceAgain(pathOfImage(sha256));
  for (const [one, bytes] of made) await writeReduced(sha256, one, bytes);
  return made.get(edge)!;
}
