/**
 * An entry of a ZIP archive says its check sum and sizes two or three times (APPNOTE 6.3, sections 4.3.7 to 4.3.12): in
 * the directory, before the content, and behind it where it was streamed. Readers take one of them; here all have to agree.
 */
export interface DirectoryEntry {
  offset: number;
  rawBitFlag: number;
  crc32: number;
  packedBytes: number;
  sizeBytes: number;
  zip64: boolean;
}

export type ReadAt = (offset: number, length: number) => Promise<Uint8Array>;

const LOCAL_BYTES = 30;
const STREAMED = 0x0008;
const DESCRIPTOR_SIGNATURE = 0x08074b50;
const ABOVE_32_BITS = 0xffff_ffff;

const viewOf = (bytes: Uint8Array) => new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);

/** A sentence on what disagrees; null where all is said alike, or where the header itself can't be read (the reader says that). */
export async function headerFault(entry: DirectoryEntry, readAt: ReadAt): Promise<string | null> {
  const bytes = await readAt(entry.offset, LOCAL_BYTES);
  if (bytes.length < LOCAL_BYTES) return null;
  const local = viewOf(bytes);
  const flags = local.getUint16(6, true);
  if (flags !== entry.rawBitFlag) return "What stands before it in the archive and the archive's directory give it other flags.";
  const streamed = (flags & STREAMED) !== 0;
  const said = [local.getUint32(14, true), local.getUint32(18, true), local.getUint32(22, true)];
  const real = [entry.crc32, entry.packedBytes, entry.sizeBytes];
  const alike = (numbers: number[]) => numbers.every((n, i) => n === real[i]);
  // a streamed entry leaves them at 0 until its end; beyond 4 GiB they stand elsewhere
  if (!entry.zip64 && !alike(said) && !(streamed && said.every((n) => n === 0))) return "What stands before it in the archive gives it another check sum or size than the directory.";
  if (!streamed || entry.zip64 || entry.packedBytes >= ABOVE_32_BITS) return null;
  const behind = await readAt(entry.offset + LOCAL_BYTES + local.getUint16(26, true) + local.getUint16(28, true) + entry.packedBytes, 16);
  if (behind.length < 12) return "What should stand behind it in the archive is cut off.";
  const descriptor = viewOf(behind);
  // its signature may be left out
  const from = descriptor.getUint32(0, true) === DESCRIPTOR_SIGNATURE ? 4 : 0;
  if (behind.length < from + 12) return "What should stand behind it in the archive is cut off.";
  const after = [0, 4, 8].map((at) => descriptor.getUint32(from + at, true));
  return alike(after) ? null : "What stands behind it in the archive gives it another check sum or size than the directory.";
}
