import sharp from "sharp";

/** Pictures made here: noise over a colour, so that no two are equal and their bytes don't shrink to nothing. */
let number = 0;

export interface PictureOptions {
  width?: number;
  height?: number;
  format?: "jpeg" | "png" | "webp";
  /** EXIF orientation, 1 to 8 */
  orientation?: number;
  /** where it was taken */
  location?: boolean;
}

export async function picture({ width = 640, height = 480, format = "jpeg", orientation, location = false }: PictureOptions = {}): Promise<Buffer> {
  number += 1;
  const colour = { r: (number * 37) % 256, g: (number * 71) % 256, b: Math.floor(Math.random() * 256) };
  const noise = { create: { width, height, channels: 3 as const, background: colour, noise: { type: "gaussian" as const, mean: 128, sigma: 20 } } };
  let image = sharp(noise)[format]();
  if (orientation) image = image.withMetadata({ orientation });
  if (location) image = image.withExif({ IFD0: { Make: "Bench phone", Model: "P1" }, IFD3: { GPSLatitudeRef: "N", GPSLatitude: "51/1 30/1 3230/100", GPSLongitudeRef: "W", GPSLongitude: "0/1 7/1 4366/100" } });
  return image.toBuffer();
}

/** The smallest file that begins and ends like a PDF. */
export const pdf = (text = "") => Buffer.from(`%PDF-1.7\n1 0 obj\n<< /Type /Catalog >>\nendobj\n% ${text}\ntrailer\n<< /Root 1 0 R >>\nstartxref\n0\n%%EOF\n`);

/** The head of an ISO base media file as phones write it: a HEIC with its brands, and nothing that could be drawn. */
export function ftyp(major: string, ...compatible: string[]): Buffer {
  const size = Buffer.alloc(4);
  size.writeUInt32BE(16 + 4 * compatible.length);
  return Buffer.concat([size, Buffer.from(`ftyp${major}\0\0\0\0${compatible.join("")}`, "latin1"), Buffer.alloc(512)]);
}

/** A JPEG with a whole web page behind its end, and a script in its comment: both a photo and a page. */
export async function polyglot(script: string): Promise<Buffer> {
  const jpeg = await picture();
  const comment = Buffer.from(`--><script>${script}</script>`);
  const length = Buffer.alloc(2);
  length.writeUInt16BE(comment.length + 2);
  return Buffer.concat([jpeg.subarray(0, 2), Buffer.from([0xff, 0xfe]), length, comment, jpeg.subarray(2), Buffer.from(`<html><body><script>${script}</script></body></html>`)]);
}
