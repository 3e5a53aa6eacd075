/**
 * The parameter table that a serial flash answers to 5Ah (JESD216 and its revisions): only what says how large the chip
 * is. The dump is taken from address 0.
 */
export interface SfdpFacts {
  /** "1.6" */
  revision: string;
  /** parameter tables announced */
  tables: number;
  /** the basic table: its length in 32-bit words and where it lies in the dump */
  words: number;
  pointer: number;
  sizeBytes: number;
}

export class SfdpError extends Error {
  /** the chip gave no answer, as opposed to an answer that makes no sense */
  constructor(readonly answered: boolean, message: string) {
    super(message);
    this.name = "SfdpError";
  }
}

const SIGNATURE = [0x53, 0x46, 0x44, 0x50];
const LEAST_WORDS = 9;

/** Size in bytes from the second word of the basic table: bits minus one, or a power of two. SfdpError past 2^63 bits. */
export function densityBytes(word: number): number {
  const power = word >= 0x8000_0000;
  const value = power ? word - 0x8000_0000 : word;
  if (power && (value > 63 || value < 3)) throw new SfdpError(true, `The table gives a size of 2 to the power of ${value} bits, which no chip has. Read the table again.`);
  const bits = power ? 2 ** value : value + 1;
  if (bits % 8 !== 0) throw new SfdpError(true, "The table gives a size that is no whole number of bytes. Read the table again.");
  return bits / 8;
}

/** Throws SfdpError when the dump doesn't hold a table. */
export function parseSfdp(dump: Uint8Array): SfdpFacts {
  if (dump.length > 0 && dump.every((byte) => byte === dump[0])) {
    throw new SfdpError(false, "The chip didn't answer: every byte of the table is the same. Check clip and supply; older chips have no such table.");
  }
  if (dump.length < 16 || SIGNATURE.some((byte, i) => dump[i] !== byte)) {
    throw new SfdpError(true, "The table doesn't begin with 53 46 44 50. Read it from address 0, with its eight waiting clocks.");
  }
  const [minor, major, more] = [dump[4], dump[5], dump[6]];
  if (major !== 1) throw new SfdpError(true, `The table is of edition ${major}.${minor}; edition 1 is known. Take the size from the marking.`);
  if (dump[8] !== 0x00 || dump[15] !== 0xff) throw new SfdpError(true, "The first table is not the basic one. Read it again from address 0.");
  const words = dump[11];
  const pointer = dump[12] | (dump[13] << 8) | (dump[14] << 16);
  if (words < LEAST_WORDS) throw new SfdpError(true, `The basic table announces ${words} words; it has ${LEAST_WORDS} or more. Read it again.`);
  if (pointer + 8 > dump.length) throw new SfdpError(true, `The dump ends before the size is told. Read ${pointer + 4 * words} bytes or more.`);
  const word = dump[pointer + 4] + dump[pointer + 5] * 0x100 + dump[pointer + 6] * 0x1_0000 + dump[pointer + 7] * 0x100_0000;
  return { revision: `${major}.${minor}`, tables: more + 1, words, pointer, sizeBytes: densityBytes(word) };
}
