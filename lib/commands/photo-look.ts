import { open } from "node:fs/promises";
import sharp, { type Metadata, type Sharp } from "sharp";
import { endingAgainst, exifHasLocation, type PhotoType, REDUCED_EDGES, type ReducedEdge, SNIFF_BYTES, sniffPhoto, TYPE_NAME, xmpHasLocation } from "@/lib/core/photo-kind";
import { withCommas } from "@/lib/core/quantity";
import type { PhotoKind } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { MAX_PHOTO_PIXELS } from "@/lib/limits";
import { inTurn } from "./in-turn";

// Of all that libvips could open, only what is taken here: whatever else claims to be a photo meets no decoder.
sharp.block({ operation: ["VipsForeignLoad"] });
sharp.unblock({ operation: ["VipsForeignLoadJpeg", "VipsForeignLoadPng", "VipsForeignLoadWebp"] });

/** What a file turned out to be when it was opened whole. */
export interface PhotoLook {
  type: PhotoType;
  kind: PhotoKind;
  /** pixels, turned the right way up; null for a document */
  width: number | null;
  height: number | null;
  hadLocation: boolean;
  /** the copies for the screen, without any metadata; none for a document */
  reduced: Map<ReducedEdge, Buffer>;
}

const FORMAT: Partial<Record<PhotoType, string>> = { "image/jpeg": "jpeg", "image/png": "png", "image/webp": "webp" };
const SECONDS = 60;
const TAIL_BYTES = 2048;

/**
 * Opens a file that somebody sent and says what it is, by its content. A photo is decoded to its end, one at a time; a
 * document is never opened, only looked at where it begins and ends. Refuses what is not taken (415) and what is broken or
 * too large when opened (422), each with a sentence that names the file.
 */
export async function lookAtPhoto(file: { path: string; sizeBytes: number }, fileName: string): Promise<PhotoLook> {
  const refuse = (code: "wrong-media-type" | "does-not-fit", sentence: string) => new AppError(code, `${fileName || "A file"}: ${sentence} Nothing was stored.`);
  const { head, tail } = await endsOf(file);
  const sniffed = sniffPhoto(head);
  if ("refused" in sniffed) throw refuse("wrong-media-type", sniffed.refused);
  const { type } = sniffed;
  const against = endingAgainst(fileName, type);
  if (against) throw refuse("wrong-media-type", against);
  if (type === "application/pdf") {
    if (!tail.includes("%%EOF")) throw refuse("does-not-fit", "This PDF breaks off before its end. Send it again from where it was made.");
    return { type, kind: "document", width: null, height: null, hadLocation: false, reduced: new Map() };
  }
  return inTurn(async () => {
    const found = await metadataOf(file.path).catch(() => null);
    if (!found?.width || found.format !== FORMAT[type]) throw refuse("does-not-fit", `This ${TYPE_NAME[type]} can't be opened: it is broken. Send it again from where it was taken.`);
    const pixels = found.width * found.height;
    if (pixels > MAX_PHOTO_PIXELS) throw refuse("does-not-fit", `This photo has ${withCommas(pixels)} pixels; up to ${withCommas(MAX_PHOTO_PIXELS)} are opened here. Take it with a lower resolution, or send a smaller copy.`);
    const reduced = await reduceAll(file.path).catch(() => null);
    if (!reduced) throw refuse("does-not-fit", `This ${TYPE_NAME[type]} breaks off or holds what can't be drawn. Send it again from where it was taken.`);
    const { width, height } = found.autoOrient;
    const hadLocation = Boolean((found.exif && exifHasLocation(found.exif)) || (found.xmp && xmpHasLocation(found.xmp)));
    return { type, kind: "photo" as const, width, height, hadLocation, reduced };
  }, "photos");
}

async function endsOf({ path, sizeBytes }: { path: string; sizeBytes: number }): Promise<{ head: Buffer; tail: string }> {
  const handle = await open(path, "r");
  try {
    const at = async (offset: number, length: number) => {
      const { buffer, bytesRead } = await handle.read(Buffer.alloc(length), 0, length, offset);
      return buffer.subarray(0, bytesRead);
    };
    return { head: await at(0, SNIFF_BYTES), tail: (await at(Math.max(0, sizeBytes - TAIL_BYTES), TAIL_BYTES)).toString("latin1") };
  } finally {
    await handle.close();
  }
}

// the limit on pixels is asked for by our own sentence first; the decoder keeps to it all the same
const opened = (path: string, limitInputPixels: number | boolean = MAX_PHOTO_PIXELS) => sharp(path, { failOn: "error", limitInputPixels, sequentialRead: true });

const metadataOf = (path: string): Promise<Metadata> => opened(path, false).metadata();

/** The copies for the screen: upright, in sRGB, on white, and with none of the original's metadata. */
async function reduceAll(path: string): Promise<Map<ReducedEdge, Buffer>> {
  const [large, small] = REDUCED_EDGES;
  const one = await shrunk(opened(path), large, 82);
  return new Map([[large, one], [small, await shrunk(sharp(one), small, 78)]]);
}

function shrunk(image: Sharp, edge: number, quality: number): Promise<Buffer> {
  return image.autoOrient().resize({ width: edge, height: edge, fit: "inside", withoutEnlargement: true }).flatten({ background: "#ffffff" })
    .toColourspace("srgb").jpeg({ quality }).timeout({ seconds: SECONDS }).toBuffer();
}

/** The same again from a stored original, for who finds no copy. */
export function reduceAgain(path: string): Promise<Map<ReducedEdge, Buffer>> {
  return inTurn(() => reduceAll(path), "photos");
}
