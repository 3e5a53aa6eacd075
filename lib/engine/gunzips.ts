import { createGunzip } from "node:zlib";
import { beginsAsGzip } from "../core/facts-kind";

/** What came out so far is thrown away; where this much came out unharmed nobody asks for the rest. */
const MOST_UNPACKED = 64 << 20;
const SLICE = 64 << 10;

/**
 * Whether the whole file is a gzip file (RFC 1952): every member unpacks, its CRC-32 and length fit, and nothing is left
 * over. Memory of one slice, time linear in the file; a file that unpacks to more than 64 MiB counts when that much did.
 */
export async function gunzips(bytes: Uint8Array): Promise<boolean> {
  if (!beginsAsGzip(bytes)) return false;
  const gunzip = createGunzip();
  return new Promise<boolean>((resolve) => {
    let unpacked = 0;
    let at = 0;
    const answer = (fits: boolean) => {
      resolve(fits);
      gunzip.destroy();
    };
    const feed = () => {
      if (gunzip.destroyed || gunzip.writableEnded) return;
      if (at >= bytes.length) return void gunzip.end();
      const slice = bytes.subarray(at, at + SLICE);
      at += slice.length;
      gunzip.write(slice, (error) => {
        if (!error) feed();
      });
    };
    gunzip.on("data", (chunk: Buffer) => {
      unpacked += chunk.length;
      if (unpacked > MOST_UNPACKED) answer(true);
    });
    gunzip.on("end", () => answer(gunzip.bytesWritten === bytes.length));
    gunzip.on("error", () => answer(false));
    feed();
  });
}
