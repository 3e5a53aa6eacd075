import { mkdirSync, writeFileSync } from "node:fs";
import path from "node:path";
import CRC32 from "crc-32";
import { randomUUID } from "node:crypto";
import { Image, Read } from "@/models";
import { sha256 } from "./factory";
import { imageFile } from "./tamper";

const AT_ONCE = 500;

/** Stored images with reads like an existing one, by the thousand: what uploads would take long for. No log entry is made. */
export async function manyReads(like: string, images: readonly Buffer[]): Promise<void> {
  const read = (await Read.findByPk(like))!;
  const image = (await Image.findByPk(read.sha256))!;
  let number = await Read.count({ where: { chipId: read.chipId, stage: read.stage } });
  for (let at = 0; at < images.length; at += AT_ONCE) {
    const rows = images.slice(at, at + AT_ONCE).map((bytes) => {
      const digest = sha256(bytes);
      const file = imageFile(digest);
      mkdirSync(path.dirname(file), { recursive: true });
      writeFileSync(file, bytes, { mode: 0o640 });
      return { sha256: Buffer.from(digest, "hex"), sizeBytes: bytes.length, crc32: CRC32.buf(bytes) >>> 0 };
    });
    const { facts, engineVersion } = image;
    await Image.bulkCreate(rows.map((row) => ({ ...row, facts, engineVersion, storedAt: new Date() })));
    await Read.bulkCreate(rows.map((row) => ({ ...read.get({ plain: true }), ...row, id: randomUUID(), number: (number += 1) })));
  }
}
