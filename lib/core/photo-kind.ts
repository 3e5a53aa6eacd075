/**
 * What a photo or document is, told by its first bytes and never by its name or by what the sender declares. Signatures:
 * PNG (W3C PNG 3rd ed., 5.2), JPEG (ITU-T T.81, SOI marker), WebP (RFC 9649), PDF (ISO 32000-2, 7.5.2), ISO base media
 * brands (ISO/IEC 14496-12, 4.3; ISO/IEC 23008-12).
 */
export const PHOTO_TYPES = ["image/jpeg", "image/png", "image/webp", "application/pdf"] as const;
export type PhotoType = (typeof PHOTO_TYPES)[number];

export const TYPE_NAME: Record<PhotoType, string> = { "image/jpeg": "JPEG", "image/png": "PNG", "image/webp": "WebP", "application/pdf": "PDF" };
/** the ending that our own names carry */
export const TYPE_ENDING: Record<PhotoType, string> = { "image/jpeg": "jpg", "image/png": "png", "image/webp": "webp", "application/pdf": "pdf" };
const ENDINGS: Record<PhotoType, readonly string[]> = {
  "image/jpeg": ["jpg", "jpeg", "jpe", "jfif"], "image/png": ["png"], "image/webp": ["webp"], "application/pdf": ["pdf"],
};
/** For a picker's `accept`. */
export const PHOTO_ACCEPT = PHOTO_TYPES.join(",");
export const TAKEN = "Photos are taken as JPEG, PNG or WebP, documents as PDF.";
/** How many of a file's first bytes `sniffPhoto` asks for. */
export const SNIFF_BYTES = 1024;

export type Sniffed = { type: PhotoType } | { refused: string };

const HEIC = new Set(["heic", "heix", "heim", "heis", "hevc", "hevx", "hevm", "hevs", "mif1", "msf1", "miaf", "heif"]);
const AVIF = new Set(["avif", "avis"]);
const OTHER: readonly (readonly [test: (head: string) => boolean, what: string])[] = [
  [(h) => h.startsWith("GIF8"), "a GIF"],
  [(h) => h.startsWith("II*\0") || h.startsWith("MM\0*") || h.startsWith("II+\0") || h.startsWith("MM\0+"), "a TIFF or a camera's raw file"],
  [(h) => h.startsWith("BM"), "a BMP"],
  [(h) => h.startsWith("\xff\x0a") || h.startsWith("\0\0\0\x0cJXL "), "a JPEG XL"],
  [(h) => h.startsWith("\0\0\0\x0cjP  ") || h.startsWith("\xff\x4f\xff\x51"), "a JPEG 2000"],
  [(h) => h.startsWith("\0\0\x01\0"), "an icon"],
  [(h) => h.startsWith("PK\x03\x04") || h.startsWith("PK\x05\x06"), "an archive or an office document"],
  [(h) => h.startsWith("\x1f\x8b") || h.startsWith("7z\xbc\xaf") || h.startsWith("Rar!"), "an archive"],
  [(h) => h.startsWith("MZ") || h.startsWith("\x7fELF"), "a program"],
  [(h) => h.slice(4, 8) === "ftyp", "a video"],
  [(h) => /^(\xef\xbb\xbf)?\s*<(\?xml|!doctype|!--|svg|html|head|body|script)/i.test(h), "a drawing or a page in markup (SVG, HTML)"],
];

/** `head`: the first SNIFF_BYTES of the file, or all of a shorter one. A refusal is a whole sentence without the file's name. */
export function sniffPhoto(head: Uint8Array): Sniffed {
  const text = Array.from(head.subarray(0, SNIFF_BYTES), (byte) => String.fromCharCode(byte)).join("");
  if (head.length === 0) return { refused: "This file is empty: 0 bytes. Take the photo again, or send it from where it was made." };
  if (text.startsWith("\xff\xd8\xff")) return { type: "image/jpeg" };
  if (text.startsWith("\x89PNG\r\n\x1a\n")) return { type: "image/png" };
  if (text.startsWith("RIFF") && text.slice(8, 12) === "WEBP") return { type: "image/webp" };
  if (/^%PDF-[12]\.\d/.test(text)) return { type: "application/pdf" };
  const brands = text.slice(4, 8) === "ftyp" ? brandsOf(text) : [];
  if (brands.some((brand) => AVIF.has(brand))) return { refused: "This is an AVIF photo. Set the camera to 'most compatible', or save it as JPEG, then send it again." };
  if (brands.some((brand) => HEIC.has(brand))) return { refused: "This is a HEIC photo. Set the phone's camera to 'most compatible', or share it as JPEG, then send it again." };
  const found = OTHER.find(([test]) => test(text))?.[1];
  return { refused: found ? `This is ${found}. ${TAKEN} Save it as one of these and send it again.` : `This is no photo or document that is known here. ${TAKEN}` };
}

/** The major and the compatible brands of an ISO base media file. */
function brandsOf(text: string): string[] {
  const size = ((text.charCodeAt(0) << 24) | (text.charCodeAt(1) << 16) | (text.charCodeAt(2) << 8) | text.charCodeAt(3)) >>> 0;
  const end = Math.min(size, text.length);
  const brands = [text.slice(8, 12)];
  for (let at = 16; at + 4 <= end; at += 4) brands.push(text.slice(at, at + 4));
  return brands;
}

/** The file's ending in lower case, "" where there is none: two to five letters or digits, the first a letter. */
export function endingOf(fileName: string): string {
  return /\.([a-z][a-z0-9]{1,4})$/i.exec(fileName)?.[1].toLowerCase() ?? "";
}

/** Null when the name's ending fits the content or when there is none; otherwise the sentence that says so. */
export function endingAgainst(fileName: string, type: PhotoType): string | null {
  const ending = endingOf(fileName);
  if (ending === "" || ENDINGS[type].includes(ending)) return null;
  return `Its name ends in .${ending}, but it holds a ${TYPE_NAME[type]}. Check that it is the right file, or let its name end in .${TYPE_ENDING[type]}, then send it again.`;
}

const GPS_POINTER = 0x8825;
const MOST_ENTRIES = 1000;

/** Whether EXIF bytes (with or without the "Exif" header) point to a GPS directory that holds anything (EXIF 2.32, 4.6.3). */
export function exifHasLocation(exif: Uint8Array): boolean {
  const start = exif.length > 6 && String.fromCharCode(...exif.subarray(0, 4)) === "Exif" ? 6 : 0;
  const bytes = new DataView(exif.buffer, exif.byteOffset + start, exif.byteLength - start);
  if (bytes.byteLength < 8) return false;
  const order = bytes.getUint16(0);
  if (order !== 0x4949 && order !== 0x4d4d) return false;
  const little = order === 0x4949;
  const count = (at: number) => (at >= 8 && at + 2 <= bytes.byteLength ? Math.min(bytes.getUint16(at, little), MOST_ENTRIES) : 0);
  const first = bytes.getUint32(4, little);
  for (let i = 0; i < count(first); i += 1) {
    const at = first + 2 + 12 * i;
    if (at + 12 > bytes.byteLength) return false;
    if (bytes.getUint16(at, little) === GPS_POINTER) return count(bytes.getUint32(at + 8, little)) > 0;
  }
  return false;
}

/** Whether an XMP packet speaks of a place (EXIF for XMP, GPS properties). */
export function xmpHasLocation(xmp: Uint8Array): boolean {
  return /exif:GPS(Latitude|Longitude)/.test(new TextDecoder("latin1").decode(xmp));
}

/** Edges of the two copies that are shown, in pixels. */
export const REDUCED_EDGES = [1600, 400] as const;
export type ReducedEdge = (typeof REDUCED_EDGES)[number];
