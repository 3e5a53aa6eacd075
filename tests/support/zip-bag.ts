import { Readable } from "node:stream";
import type { BundleFile } from "@/lib/commands/bundle-files";
import { zipStream } from "@/lib/commands/bundle-zip";
import { type Bag, FOLDER, hex } from "./make-bag";

/** The archive that the app would send of these files. */
export async function zipBag(bag: Bag): Promise<Buffer> {
  const files = [...bag].map(([path, bytes]): BundleFile => ({ path, sha256: hex(bytes), sizeBytes: bytes.length, open: () => Readable.from([bytes], { objectMode: false }), ...(path === "check.sh" ? { executable: true } : {}) }));
  const stream = zipStream(files, { folder: FOLDER, date: new Date("2026-03-12T14:00:00Z"), completed: () => Promise.resolve() });
  const chunks: Buffer[] = [];
  for await (const chunk of stream) chunks.push(chunk as Buffer);
  return Buffer.concat(chunks);
}
