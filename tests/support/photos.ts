import { Readable } from "node:stream";
import type { PhotoFile } from "@/lib/commands/add-photos";
import { receive } from "@/storage";

/** As the upload leaves it: in the incoming folder, hashed. */
export async function arrivedPhoto(bytes: Buffer, fileName = "photo.jpg", caption: string | null = null): Promise<PhotoFile> {
  return { arrived: await receive(Readable.from([bytes])), fileName, caption };
}
