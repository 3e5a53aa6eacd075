/** Blocks of an image by what fills them, so that searches may step over long stretches of FF or 00. */
export const FILL_BLOCK = 256;
/** classes of a block: 1 all FF, 2 all 00, 0 anything else */
export type FillMap = Uint8Array;

export function isFill(value: number): boolean {
  return value === 0xff || value === 0;
}

function classOf(bytes: Uint8Array, from: number, to: number): number {
  const value = bytes[from];
  if (!isFill(value)) return 0;
  for (let i = from + 1; i < to; i += 1) if (bytes[i] !== value) return 0;
  return value === 0xff ? 1 : 2;
}

export function fillMapOf(bytes: Uint8Array): FillMap {
  const map = new Uint8Array(Math.ceil(bytes.length / FILL_BLOCK));
  for (let block = 0; block < map.length; block += 1) {
    map[block] = classOf(bytes, block * FILL_BLOCK, Math.min(bytes.length, (block + 1) * FILL_BLOCK));
  }
  return map;
}

/** Length of the run of the last byte's value at the end, in bytes. */
export function endRunOf(bytes: Uint8Array): number {
  let at = bytes.length;
  while (at > 0 && bytes[at - 1] === bytes[bytes.length - 1]) at -= 1;
  return bytes.length - at;
}
