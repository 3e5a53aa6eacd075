import { once } from "node:events";
import { PassThrough, Readable } from "node:stream";
import { ZipArchive } from "archiver";
import type { BundleFile } from "./bundle-files";

interface Options {
  /** the folder inside the archive */
  folder: string;
  /** the date of every file in it */
  date: Date;
  /** awaited after the last byte was taken and before the end shows: when it throws the archive breaks off */
  completed(): Promise<void>;
}

/**
 * A stored ZIP of these files, one opened at a time, in constant memory. Whatever goes wrong on the way breaks the
 * stream before the archive's directory, which stands at its end: such a file does not open. Closing the stream stops it.
 */
export function zipStream(files: BundleFile[], { folder, date, completed }: Options): Readable {
  const zip = new ZipArchive({ store: true, forceZip64: false });
  const out = new PassThrough({ highWaterMark: 256 * 1024 });
  const stop = (error?: Error) => {
    if (!out.destroyed) out.destroy(error);
  };
  zip.on("warning", stop);
  zip.on("error", stop);
  // without a listener an abort would be an uncaught error; the reader below sees it anyway
  out.on("error", () => {});
  const closed = once(out, "close").catch(() => {});
  void closed.then(() => {
    if (!out.readableEnded) zip.abort();
  });

  async function feed(): Promise<void> {
    for (const file of files) {
      const source = file.open();
      source.once("error", stop);
      const entered = new Promise<void>((done) => zip.once("entry", () => done()));
      zip.append(source, { name: `${folder}/${file.path}`, date, mode: file.executable ? 0o755 : 0o644 });
      await Promise.race([entered, closed]);
      if (out.destroyed) {
        source.destroy();
        return;
      }
    }
    await zip.finalize();
  }

  async function* flow(): AsyncGenerator<Buffer> {
    zip.pipe(out);
    feed().catch(stop);
    for await (const chunk of out) yield chunk as Buffer;
    await completed();
  }
  // a mark of one byte: the flow is asked for more only when the receiver has taken what was there
  const stream = Readable.from(flow(), { objectMode: false, highWaterMark: 1 });
  stream.once("close", () => stop());
  return stream;
}
