import { asBytes, createImageFill, createTextSink, eachLine, FormatError, hexLine, hexOf, type ImageWindow, type OnData, type TextImage } from "./text-record";

/** Intel HEX, after the "Hexadecimal Object File Format Specification", revision A of 6 January 1988. */

const COLON = 0x3a;
const SAVE_AGAIN = "Save the text again and send it unchanged.";
/** count, address, type, 255 data bytes, checksum */
const LONGEST = 260;
/** where addresses wrap after type 02, and otherwise */
const SEGMENT = 0x1_0000;
const LINEAR = 0x1_0000_0000;
/** data bytes of the types 01 to 05 */
const FIXED_LENGTH = [NaN, 0, 2, 4, 2, 4];

function checkLength(type: number, length: number, line: number): void {
  if (type > 5) throw new FormatError(line, `is a record of type ${hexOf(type)}; types 00 to 05 exist. Check that it is an Intel HEX text.`);
  if (type !== 0 && length !== FIXED_LENGTH[type]) throw new FormatError(line, `is a record of type ${hexOf(type)} with ${length} data bytes; it has ${FIXED_LENGTH[type]}. ${SAVE_AGAIN}`);
}

/**
 * Walks all records and hands data over with absolute addresses. After type 02 an address wraps inside its 64 KiB
 * segment, after type 04 inside 4 GiB; without either it counts on as after a type 04 of 0.
 */
export function walkIntelHex(text: string | Uint8Array, onData: OnData): { records: number; start?: string } {
  const source = asBytes(text);
  const values = new Uint8Array(LONGEST);
  let [base, wrap, ended] = [0, LINEAR, 0];
  let start: string | undefined;

  function give(at: number, length: number, line: number): void {
    if (length === 0) return;
    const lift = wrap === SEGMENT ? base : 0;
    const offset = wrap === SEGMENT ? at : base + at;
    const first = Math.min(length, wrap - offset);
    onData(lift + offset, values, 4, 4 + first, line);
    if (first < length) onData(lift, values, 4 + first, 4 + length, line);
  }

  const records = eachLine(source, (from, to, line) => {
    if (ended > 0) throw new FormatError(line, `follows the end record of line ${ended}. Send one image in one text.`);
    if (source[from] !== COLON) throw new FormatError(line, "doesn't begin with a colon. Check that it is an Intel HEX text.");
    const count = hexLine(source, from + 1, to, values, line);
    if (count < 5) throw new FormatError(line, `is too short for a record. ${SAVE_AGAIN}`);
    const length = values[0];
    if (count !== length + 5) throw new FormatError(line, `announces ${length} data bytes and holds ${Math.max(0, count - 5)}. ${SAVE_AGAIN}`);
    let sum = 0;
    for (let i = 0; i < count - 1; i += 1) sum += values[i];
    const wanted = -sum & 0xff;
    if (values[count - 1] !== wanted) throw new FormatError(line, `has the checksum ${hexOf(values[count - 1])}, and its bytes give ${hexOf(wanted)}. ${SAVE_AGAIN}`);
    const type = values[3];
    checkLength(type, length, line);
    const word = (i: number) => (values[i] << 8) | values[i + 1];
    if (type === 0) give(word(1), length, line);
    else if (type === 1) ended = line;
    else if (type === 2) [base, wrap] = [word(4) * 16, SEGMENT];
    else if (type === 4) [base, wrap] = [word(4) * 0x1_0000, LINEAR];
    else start = type === 3 ? `${hexOf(word(4), 4)}:${hexOf(word(6), 4)}` : hexOf(word(4) * 0x1_0000 + word(6), 8);
  });
  if (ended === 0) throw new FormatError(Math.max(1, records), "is the last one and no end record: the text is cut off. Save it again.");
  return start === undefined ? { records } : { records, start };
}

/** The image in [base, base + size). Throws FormatError with the line for whatever is not exactly right. */
export function parseIntelHex(text: string | Uint8Array, window: ImageWindow): TextImage {
  const fill = createImageFill(window);
  const walked = walkIntelHex(text, fill.put);
  return { ...fill.finish(), ...walked };
}

/** Lines of 16 data bytes; a type 04 record wherever the upper half of the address changes. `base`: address of the first byte. */
export function encodeIntelHex(bytes: Uint8Array, { base = 0 }: { base?: number } = {}): Uint8Array<ArrayBuffer> {
  if (!Number.isSafeInteger(base) || base < 0 || base + bytes.length > 0x1_0000_0000) throw new FormatError(0, "Intel HEX holds addresses up to FFFFFFFF. Give a lower base.");
  const sink = createTextSink(Math.ceil(bytes.length / 16) * 44 + 32);
  const values = new Uint8Array(21);
  const write = (type: number, address: number, data: Uint8Array) => {
    values.set([data.length, (address >> 8) & 0xff, address & 0xff, type]);
    values.set(data, 4);
    let sum = 0;
    for (let i = 0; i < 4 + data.length; i += 1) sum += values[i];
    values[4 + data.length] = -sum & 0xff;
    sink.record(":", values, 5 + data.length);
  };
  let upper = 0;
  for (let at = 0; at < bytes.length; ) {
    const address = base + at;
    const half = Math.floor(address / 0x1_0000);
    if (half !== upper) {
      write(4, 0, Uint8Array.of(half >> 8, half & 0xff));
      upper = half;
    }
    // up to the next multiple of 16, so that no line crosses 64 KiB
    const length = Math.min(bytes.length - at, 16 - (address % 16));
    write(0, address % 0x1_0000, bytes.subarray(at, at + length));
    at += length;
  }
  write(1, 0, new Uint8Array(0));
  return sink.finish();
}

export function printIntelHex(bytes: Uint8Array, options: { base?: number } = {}): string {
  return new TextDecoder().decode(encodeIntelHex(bytes, options));
}
