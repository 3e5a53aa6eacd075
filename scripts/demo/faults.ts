/** What goes wrong at a bench, done to a copy of an image. */

const RUNS = [[0x1f0c4, 24], [0x1f238, 40], [0x1f5a0, 32], [0x1f81c, 18], [0x1fa40, 36], [0x1fcd0, 48], [0x1fe62, 16]] as const;

/** The clip lost contact: 214 bytes of FF in seven runs, all in 0x1F000–0x1FFFF. */
export function lostContact(image: Buffer): Buffer {
  const read = Buffer.from(image);
  for (const [start, length] of RUNS) read.fill(0xff, start, start + length);
  return read;
}

/** The highest address line is stuck: the second half repeats the first. */
export function stuckAddressLine(image: Buffer): Buffer {
  const half = image.subarray(0, image.length / 2);
  return Buffer.concat([half, half]);
}

/** Written without an erase: a bit that was 0 stays 0. */
export function notErased(approved: Buffer, old: Buffer): Buffer {
  return Buffer.from(approved.map((byte, at) => byte & old[at]));
}

/** No power at the chip: all FF. */
export const unpowered = (sizeBytes: number): Buffer => Buffer.alloc(sizeBytes, 0xff);
