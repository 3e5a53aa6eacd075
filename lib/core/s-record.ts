import { asBytes, createImageFill, createTextSink, eachLine, FormatError, hexLine, hexOf, type ImageWindow, type OnData, type TextImage } from "./text-record";

/** Motorola S-record, after the 68000 family programmer's manual as srec_motorola(5) restates it. */

const S = 0x53;
const SAVE_AGAIN = "Save the text again and send it unchanged.";
/** address bytes by type; type 4 is reserved */
const ADDRESS_BYTES: Record<number, number> = { 0: 2, 1: 2, 2: 3, 3: 4, 5: 2, 6: 3, 7: 4, 8: 3, 9: 2 };

function addressOf(values: Uint8Array, bytes: number): number {
  let address = 0;
  for (let i = 0; i < bytes; i += 1) address = address * 256 + values[1 + i];
  return address;
}

/** Walks all records and hands data over with absolute addresses. */
export function walkSRecord(text: string | Uint8Array, onData: OnData): { records: number; start?: string } {
  const source = asBytes(text);
  const values = new Uint8Array(256);
  let [data, counted, ended] = [0, 0, 0];
  let start: string | undefined;

  function readRecord(from: number, to: number, line: number): { type: number; address: number; dataFrom: number; dataTo: number } {
    if (source[from] !== S) throw new FormatError(line, "doesn't begin with S. Check that it is an S-record text.");
    const type = source[from + 1] - 0x30;
    const addressBytes = ADDRESS_BYTES[type];
    if (addressBytes === undefined) throw new FormatError(line, "is a record of a type that doesn't exist: S0 to S3 and S5 to S9 do. Check that it is an S-record text.");
    const count = hexLine(source, from + 2, to, values, line);
    if (count < 1 || values[0] !== count - 1) throw new FormatError(line, `announces ${count < 1 ? 0 : values[0]} bytes and holds ${Math.max(0, count - 1)}. ${SAVE_AGAIN}`);
    if (count < 2 + addressBytes) throw new FormatError(line, `is too short for an S${type} record. ${SAVE_AGAIN}`);
    let sum = 0;
    for (let i = 0; i < count - 1; i += 1) sum += values[i];
    const wanted = ~sum & 0xff;
    if (values[count - 1] !== wanted) throw new FormatError(line, `has the checksum ${hexOf(values[count - 1])}, and its bytes give ${hexOf(wanted)}. ${SAVE_AGAIN}`);
    if (type >= 5 && count !== 2 + addressBytes) throw new FormatError(line, `is an S${type} record with data, and it has none. ${SAVE_AGAIN}`);
    return { type, address: addressOf(values, addressBytes), dataFrom: 1 + addressBytes, dataTo: count - 1 };
  }

  const records = eachLine(source, (from, to, line) => {
    if (ended > 0) throw new FormatError(line, `follows the end record of line ${ended}. Send one image in one text.`);
    const { type, address, dataFrom, dataTo } = readRecord(from, to, line);
    if (type >= 1 && type <= 3) {
      if (counted > 0) throw new FormatError(line, `is data after the count of line ${counted}. ${SAVE_AGAIN}`);
      if (address + dataTo - dataFrom > 256 ** ADDRESS_BYTES[type]) throw new FormatError(line, `runs past the last address that an S${type} record can name. ${SAVE_AGAIN}`);
      data += 1;
      onData(address, values, dataFrom, dataTo, line);
    } else if (type === 5 || type === 6) {
      if (address !== data) throw new FormatError(line, `counts ${address} data records, and ${data} came before it. A part of the text is missing: save it again.`);
      counted = line;
    } else if (type >= 7) {
      ended = line;
      start = hexOf(address, 2 * ADDRESS_BYTES[type]);
    }
  });
  // a right count says as much as an end record: some programs write only that
  if (ended === 0 && counted === 0) throw new FormatError(Math.max(1, records), "is the last one and neither a count (S5, S6) nor an end record (S7, S8, S9): the text looks cut off. Save it again.");
  return start === undefined ? { records } : { records, start };
}

/** The image in [base, base + size). Throws FormatError with the line for whatever is not exactly right. */
export function parseSRecord(text: string | Uint8Array, window: ImageWindow): TextImage {
  const fill = createImageFill(window);
  const walked = walkSRecord(text, fill.put);
  return { ...fill.finish(), ...walked };
}

/** S0, lines of 16 data bytes with the shortest address that fits, their count where 16 bits hold it, the end record. */
export function encodeSRecord(bytes: Uint8Array, { base = 0 }: { base?: number } = {}): Uint8Array<ArrayBuffer> {
  const last = base + Math.max(0, bytes.length - 1);
  if (!Number.isSafeInteger(base) || base < 0 || last > 0xffffffff) throw new FormatError(0, "S-record holds addresses up to FFFFFFFF. Give a lower base.");
  const type = last <= 0xffff ? 1 : last <= 0xffffff ? 2 : 3;
  const sink = createTextSink(Math.ceil(bytes.length / 16) * 47 + 64);
  const values = new Uint8Array(22);
  const write = (kind: number, address: number, data: Uint8Array) => {
    const addressBytes = ADDRESS_BYTES[kind];
    const length = 1 + addressBytes + data.length;
    values[0] = length;
    for (let i = 0; i < addressBytes; i += 1) values[1 + i] = Math.floor(address / 256 ** (addressBytes - 1 - i)) & 0xff;
    values.set(data, 1 + addressBytes);
    let sum = 0;
    for (let i = 0; i < length; i += 1) sum += values[i];
    values[length] = ~sum & 0xff;
    sink.record(`S${kind}`, values, length + 1);
  };
  const none = new Uint8Array(0);
  write(0, 0, none);
  let lines = 0;
  for (let at = 0; at < bytes.length; lines += 1) {
    const length = Math.min(bytes.length - at, 16 - ((base + at) % 16));
    write(type, base + at, bytes.subarray(at, at + length));
    at += length;
  }
  // S6, the count in 24 bits, is unknown to many readers
  if (lines <= 0xffff) write(5, lines, none);
  write(10 - type, 0, none);
  return sink.finish();
}

export function printSRecord(bytes: Uint8Array, options: { base?: number } = {}): string {
  return new TextDecoder().decode(encodeSRecord(bytes, options));
}
