import { compareIfStored } from "@/lib/commands/compare-images";
import { breathe, inTurn } from "@/lib/commands/in-turn";
import { createWindowLane } from "@/lib/core/compare";
import { CELLS, createStrip, loupeWindow } from "@/lib/core/strip";
import type { StripLane, StripRow, StripStackView, StripView } from "@/lib/views";
import { imageWindow } from "@/storage";

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
function once<T extends string | number[]>(key: string, make: () => Promise<T>): Promise<T> {
  const known = kept.get(key) as Promise<T> | undefined;
  if (known) return known;
  const made = make();
  kept.set(key, made);
  made.catch(() => kept.delete(key));
  if (kept.size > KEPT) kept.delete(kept.keys().next().value!);
  return made;
}

/** 256 cells of a window of one image; addresses past the image's end are "not read". */
export function cellsOf(sha256: string, sizeBytes: number, offset: number, length: number): Promise<string> {
  return once(`${sha256}:${offset}:${length}`, () => inTurn(async () => {
    const strip = createStrip({ offset, length, cells: CELLS });
    const end = Math.min(offset + length, sizeBytes);
    for (let at = offset; at < end; at += STEP) {
      const bytes = await stored(sha256, at, Math.min(STEP, end - at));
      if (!bytes) break;
      strip.push(bytes, at);
      await breathe();
    }
    return strip.finish();
  }));
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

function laneOf(a: StripImage, b: StripImage, offset: number, length: number): Promise<number[]> {
  return once(`${a.sha256}:${b.sha256}:${offset}:${length}`, () => inTurn(async () => {
    const lane = createWindowLane({ offset, length, cells: CELLS });
    const end = Math.min(offset + length, Math.max(a.sizeBytes, b.sizeBytes));
    for (let at = offset; at < end; at += STEP) {
      const step = Math.min(STEP, end - at);
      const [bytesA, bytesB] = [await stored(a.sha256, at, step), await stored(b.sha256, at, step)];
      if (!bytesA || !bytesB) break;
      lane.push(bytesA, bytesB, at);
      await breathe();
    }
    return lane.finish();
  }));
}

/** The strips of these images over a window, with the lanes between neighbours. */
export async function stripView(images: StripImage[], offset: number, length: number): Promise<StripView> {
  const rows: StripRow[] = [];
  const lanes: StripLane[] = [];
  for (const [i, image] of images.entries()) {
    rows.push({ readId: image.readId, name: image.name, note: image.note, cells: await cellsOf(image.sha256, image.sizeBytes, offset, length) });
    const next = images[i + 1];
    if (!next) continue;
    if (next.sha256 === image.sha256) {
      lanes.push({ differingBytes: 0, cells: null });
      continue;
    }
    const cells = await laneOf(image, next, offset, length);
    lanes.push({ differingBytes: (await compareIfStored(image, next))?.differingBytes ?? 0, cells });
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
