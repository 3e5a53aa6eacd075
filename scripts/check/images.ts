import { readdir } from "node:fs/promises";
import path from "node:path";
import type { Transaction } from "sequelize";
import { env } from "@/lib/env";
import { Image } from "@/models";
import { checkImage, liesStill } from "@/storage";
import type { Logged } from "./logged";
import type { Places, PlacedRead } from "./places";
import type { Damage, StoreReport } from "./report";

export interface StoredImage {
  sha256: string;
  sizeBytes: number;
  crc32: string;
  /** by its row */
  erased: boolean;
}

export async function storedImages(tx: Transaction): Promise<StoredImage[]> {
  const rows = await Image.findAll({ attributes: ["sha256", "sizeBytes", "crc32", "state"], transaction: tx, raw: true });
  return rows.map((row) => ({ sha256: row.sha256.toString("hex"), sizeBytes: row.sizeBytes, crc32: row.crc32.toString(16).padStart(8, "0"), erased: row.state === "erased" }));
}

/** Reads every stored image whole and compares it with its digest and size. `tick` is called after each. */
export async function checkImages(images: StoredImage[], places: Places, tick: (done: number) => void): Promise<{ counts: StoreReport["images"]; damage: Damage[] }> {
  const counts = { checked: 0, bytes: 0, damaged: 0, missing: 0, erased: 0 };
  const found: Damage[] = [];
  const users = grouped(places.reads);
  for (const { sha256, sizeBytes, erased } of images) {
    if (erased) {
      counts.erased += 1;
      // a restored backup brings files back; the next start or round takes them away again
      if (await liesStill(sha256)) found.push({ place: `Image ${sha256}`, seq: null, problem: "image-left", sentence: "The image was erased, and bytes of it are still in the store. Start Twinread: it takes them away.", chain: null, sha256, reads: (users.get(sha256) ?? []).map((read) => read.name) });
      continue;
    }
    const state = await checkImage(sha256, sizeBytes);
    counts.checked += 1;
    counts.bytes += sizeBytes;
    tick(counts.checked);
    if (state === "sound") continue;
    // erased since the database was looked at: the next run sees its entry
    if ((await Image.findByPk(Buffer.from(sha256, "hex"), { attributes: ["state"] }))?.state === "erased") continue;
    counts[state] += 1;
    const sentence = state === "missing" ? "The stored image is missing." : "The stored image is not the one that was stored: its bytes or its size changed.";
    found.push({
      place: `Image ${sha256}`, seq: null, problem: `image-${state}`, sentence, chain: null, sha256, reads: (users.get(sha256) ?? []).map((read) => read.name),
    });
  }
  return { counts, damage: found };
}

function grouped(reads: PlacedRead[]): Map<string, PlacedRead[]> {
  const groups = new Map<string, PlacedRead[]>();
  for (const read of reads) groups.set(read.sha256, [...(groups.get(read.sha256) ?? []), read]);
  return groups;
}

/** Every read has its image's row and its log entry, all three say the same, and no logged read is without its row. */
export function checkReads(images: StoredImage[], places: Places, logged: Pick<Logged, "reads">): Damage[] {
  const found: Damage[] = [];
  const bySha = new Map(images.map((image) => [image.sha256, image]));
  const say = (read: PlacedRead, seq: number | null, problem: Damage["problem"], sentence: string, expected?: string, is?: string) =>
    found.push({ place: read.name, seq, problem, sentence, chain: read.driveId, sha256: read.sha256, reads: [], expected, found: is });
  for (const read of places.reads) {
    const image = bySha.get(read.sha256);
    if (!image) say(read, null, "image-record", "The read has no image on record.");
    else if (image.sizeBytes !== read.sizeBytes || image.crc32 !== read.crc32) {
      say(read, null, "image-record", "The read's size or CRC-32 is not its image's.", `${image.sizeBytes} bytes, ${image.crc32}`, `${read.sizeBytes} bytes, ${read.crc32}`);
    }
    const entry = logged.reads.get(read.id);
    const [fromLog, fromRow] = [entry && `${entry.sha256}, ${entry.sizeBytes} bytes, ${entry.crc32}`, `${read.sha256}, ${read.sizeBytes} bytes, ${read.crc32}`];
    if (!entry) say(read, null, "read-not-in-log", "The read stands in the database, but no entry of the log says that it was stored.");
    else if (entry.chain !== read.driveId) say(read, entry.seq, "read-differs-from-log", "The read stands under another drive than the log says.", places.chain(entry.chain), places.chain(read.driveId));
    else if (fromLog !== fromRow) say(read, entry.seq, "read-differs-from-log", "The read is not the one that the log says was stored.", fromLog, fromRow);
  }
  const known = new Set(places.reads.map((read) => read.id));
  for (const [id, entry] of logged.reads) {
    if (known.has(id)) continue;
    found.push({ place: places.chain(entry.chain), seq: entry.seq, problem: "read-missing", sentence: "The log says that a read was stored, and the read is gone from the database.", chain: entry.chain, sha256: entry.sha256, reads: [] });
  }
  return found;
}

/** Files under the images' names that no row knows. */
export async function countUnknownFiles(images: StoredImage[]): Promise<number> {
  const known = new Set(images.map((image) => image.sha256));
  const files = await readdir(path.join(env().dataDir, "images", "sha256"), { recursive: true }).catch(() => [] as string[]);
  return files.map((file) => path.basename(file)).filter((name) => name.length === 64 && !known.has(name)).length;
}
