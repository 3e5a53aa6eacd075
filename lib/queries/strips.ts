import { Op } from "sequelize";
import { compareIfStored } from "@/lib/commands/compare-images";
import { breathe, inTurn } from "@/lib/commands/in-turn";
import { reportImage } from "@/lib/commands/report-image";
import { createWindowLane } from "@/lib/core/compare";
import { CELLS, createStrip, loupeWindow } from "@/lib/core/strip";
import type { StripLane, StripRow, StripStackView, StripView } from "@/lib/views";
import { Image } from "@/models";
import { imageWindow, stateNow } from "@/storage";

const STEP = 1024 * 1024;
const KEPT = 4000;

export interface StripImage {
  readId: string;
  name: string;
  note: string;
  sha256: string;
  sizeBytes: number;
}

// Images never change, so a strip of a digest is true for ever: kept in memory, oldest dropped first.
const kept = new Map<string, Promise<string | number[]>>();
function once<T extends string | number[]>(key: string, make: () => Promise<T | null>): Promise<T | null> {
  const known = kept.get(key) as Promise<T | null> | undefined;
  if (known) return known;
  const made = make();
  kept.set(key, made as Promise<T>);
  // null: an image was not sound; it may be again
  made.then((one) => one === null && kept.delete(key), () => kept.delete(key));
  if (kept.size > KEPT) kept.delete(kept.keys().next().value!);
  return made;
}

/** 256 cells of a window of one image; addresses past the image's end are "not read". */
export async function cellsOf(sha256: string, sizeBytes: number, offset: number, length: number): Promise<string> {
  const window = { offset, length, cells: CELLS };
  return (await once(`${sha256}:${offset}:${length}`, () => inTurn(async () => {
    if (!(await sound({ sha256, sizeBytes }))) return null;
    const strip = createStrip(window);
    const end = Math.min(offset + length, sizeBytes);
    for (let at = offset; at < end; at += STEP) {
      const bytes = await stored(sha256, at, Math.min(STEP, end - at));
      if (!bytes) return null;
      strip.push(bytes, at);
      await breathe();
    }
    return strip.finish();
  }))) ?? createStrip(window).finish();
}

/** A damaged image is not drawn: its cells show as not read, and it is written down. */
async function sound({ sha256, sizeBytes }: Pick<StripImage, "sha256" | "sizeBytes">): Promise<boolean> {
  const state = await stateNow(sha256, sizeBytes);
  if (state !== "sound") reportImage(sha256, state, "a strip").catch((error: unknown) => console.error("could not record a damaged image:", (error as Error).message));
  return state === "sound";
}

/** A window of an image, or null when the stored image is gone: its cells then show as not read. */
async function stored(sha256: string, offset: number, length: number): Promise<Buffer | null> {
  try {
    return await imageWindow(sha256, offset, length);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === "ENOENT") return null;
    throw error;
  }
}

async function laneOf(a: StripImage, b: StripImage, offset: number, length: number): Promise<number[]> {
  const window = { offset, length, cells: CELLS };
  return (await once(`${a.sha256}:${b.sha256}:${offset}:${length}`, () => inTurn(async () => {
    if (!(await sound(a)) || !(await sound(b))) return null;
    const lane = createWindowLane(window);
    const end = Math.min(offset + length, Math.max(a.sizeBytes, b.sizeBytes));
    for (let at = offset; at < end; at += STEP) {
      const step = Math.min(STEP, end - at);
      const [bytesA, bytesB] = [await stored(a.sha256, at, step), await stored(b.sha256, at, step)];
      if (!bytesA || !bytesB) return null;
      lane.push(bytesA, bytesB, at);
      await breathe();
    }
    return lane.finish();
  }))) ?? createWindowLane(window).finish();
}

/** Those on record as damaged, missing or erased: not drawn, even where a strip from before is still in memory. */
async function unsoundOf(images: readonly StripImage[]): Promise<{ unsound: Set<string>; erased: Set<string> }> {
  const sha256 = [...new Set(images.map((image) => image.sha256))].map((digest) => Buffer.from(digest, "hex"));
  const rows = sha256.length === 0 ? [] : await Image.findAll({ attributes: ["sha256", "state"], where: { sha256, state: { [Op.ne]: "sound" } } });
  const hex = (list: typeof rows) => new Set(list.map((row) => row.sha256.toString("hex")));
  return { unsound: hex(rows), erased: hex(rows.filter((row) => row.state === "erased")) };
}

/** The strips of these images over a window, with the lanes between neighbours. */
export async function stripView(images: StripImage[], offset: number, length: number): Promise<StripView> {
  const rows: StripRow[] = [];
  const lanes: StripLane[] = [];
  const { unsound, erased } = await unsoundOf(images);
  for (const [i, image] of images.entries()) {
    const cells = unsound.has(image.sha256) ? createStrip({ offset, length, cells: CELLS }).finish() : await cellsOf(image.sha256, image.sizeBytes, offset, length);
    rows.push({ readId: image.readId, name: image.name, note: erased.has(image.sha256) ? "erased" : image.note, cells });
    const next = images[i + 1];
    if (!next) continue;
    if (next.sha256 === image.sha256) {
      lanes.push({ differingBytes: 0, cells: null });
      continue;
    }
    if (unsound.has(image.sha256) || unsound.has(next.sha256)) {
      lanes.push({ differingBytes: 0, cells: null });
      continue;
    }
    const lane = await laneOf(image, next, offset, length);
    lanes.push({ differingBytes: (await compareIfStored(image, next))?.differingBytes ?? 0, cells: lane });
  }
  return { offset, cellBytes: length / CELLS, rows, lanes };
}

/** The whole stack over the chip (or the longest image), with the loupe when all differences lie close together. */
export async function stripStack(images: StripImage[], chipSizeBytes: number): Promise<StripStackView> {
  const sizeBytes = Math.max(chipSizeBytes, ...images.map((i) => i.sizeBytes));
  const stack = await stripView(images, 0, sizeBytes);
  let first: number | null = null;
  let last: number | null = null;
  for (let i = 0; i + 1 < images.length; i += 1) {
    if (images[i].sha256 === images[i + 1].sha256) continue;
    const c = await compareIfStored(images[i], images[i + 1]);
    if (!c || c.first === null || c.last === null) continue;
    first = Math.min(first ?? c.first, c.first);
    last = Math.max(last ?? c.last, c.last);
  }
  const window = first !== null && last !== null ? loupeWindow(sizeBytes, first, last) : null;
  return { ...stack, sizeBytes, loupe: window && (await stripView(images, window.offset, Math.min(window.length, sizeBytes - window.offset))) };
}
