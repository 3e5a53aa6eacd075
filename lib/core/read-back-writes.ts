import { PAGE_LEAST, PAGE_MOST, PROTECT_PARTS, SECTOR_SIZES } from "./thresholds";

/** How a write can go wrong, byte by byte: what was to be written, what the chip held before, what was read back. */

const FF = 0xff;

/** What a chip of `chip`-byte pages holds at `at` when a tool writes pages of `tool` bytes: each page wraps within itself. */
function wrapped(image: Uint8Array, old: Uint8Array | null, at: number, tool: number, chip: number): number {
  const page = at - (at % tool);
  const inPage = at - page;
  const end = Math.min(image.length, page + tool) - page;
  if (inPage >= chip) return old ? old[at] : FF;
  // the last byte of the page's data that lands here
  const last = inPage + Math.floor((end - 1 - inPage) / chip) * chip;
  return image[page + last];
}

interface Span {
  first: number;
  last: number;
}

function differing(a: Uint8Array, b: Uint8Array): Span {
  let first = 0;
  while (first < a.length && a[first] === b[first]) first += 1;
  let last = a.length - 1;
  while (last >= 0 && a[last] === b[last]) last -= 1;
  return { first, last };
}

function wrapFits(readBack: Uint8Array, image: Uint8Array, old: Uint8Array | null, tool: number, chip: number, { first, last }: Span): boolean {
  // the ends of what differs rule most page sizes out without a look at the rest
  for (const at of [first, last]) if (readBack[at] !== wrapped(image, old, at, tool, chip)) return false;
  for (let at = 0; at < readBack.length; at += 1) if (readBack[at] !== wrapped(image, old, at, tool, chip)) return false;
  return true;
}

/** V5: page sizes of tool and chip that explain every byte, the smallest that do; over old content or an erased chip. */
export function pageWrap(readBack: Uint8Array, image: Uint8Array, old: Uint8Array | null): { tool: number; chip: number } | null {
  const span = differing(readBack, image);
  if (span.last < 0) return null;
  for (let tool = 2 * PAGE_LEAST; tool <= PAGE_MOST; tool *= 2) {
    for (let chip = PAGE_LEAST; chip < tool; chip *= 2) {
      if (chip >= readBack.length) break;
      if ((old && wrapFits(readBack, image, old, tool, chip, span)) || wrapFits(readBack, image, null, tool, chip, span)) return { tool, chip };
    }
  }
  return null;
}

/** The roundest address in (after, upTo], if protected areas may end there. */
function boundaryIn(after: number, upTo: number, size: number): number | null {
  if (after < 0) return null;
  let step = 1;
  while (Math.floor(upTo / (step * 2)) * step * 2 > after) step *= 2;
  const boundary = Math.floor(upTo / step) * step;
  return boundary > 0 && boundary < size && step * PROTECT_PARTS >= size ? boundary : null;
}

/** V6: written up to, or from, a boundary; the rest still holds what was there before. `kept` is that rest. */
export function protectedPart(readBack: Uint8Array, image: Uint8Array, old: Uint8Array): { start: number; length: number } | null {
  const [offImage, offOld, size] = [differing(readBack, image), differing(readBack, old), readBack.length];
  const upper = offOld.last < offImage.first ? boundaryIn(offOld.last, offImage.first, size) : null;
  if (upper !== null) return { start: upper, length: size - upper };
  const lower = offImage.last < offOld.first ? boundaryIn(offImage.last, offOld.first, size) : null;
  return lower === null ? null : { start: 0, length: lower };
}

/** Whether one rule gives every byte of the read-back that differs from the image. */
export function explainsAll(readBack: Uint8Array, image: Uint8Array, rule: (at: number) => number): boolean {
  for (let at = 0; at < readBack.length; at += 1) if (readBack[at] !== image[at] && readBack[at] !== rule(at)) return false;
  return true;
}

function allErased(readBack: Uint8Array, start: number, end: number): boolean {
  for (let at = start; at < end; at += 1) if (readBack[at] !== FF) return false;
  return true;
}

/** The smallest whole sector around all differences, or the row of sectors, if it reads FF throughout. */
export function erasedSector(readBack: Uint8Array, first: number, last: number): { start: number; length: number } | null {
  const [small] = SECTOR_SIZES;
  const row = { start: Math.floor(first / small) * small, end: Math.ceil((last + 1) / small) * small };
  const sector = SECTOR_SIZES.map((length) => ({ start: Math.floor(first / length) * length, end: Math.floor(first / length) * length + length }))
    .find(({ end }) => last < end) ?? row;
  for (const { start, end } of [sector, row]) {
    // the whole chip would be no sector of it
    if (end <= readBack.length && end - start < readBack.length && allErased(readBack, start, end)) return { start, length: end - start };
  }
  return null;
}
