import { Readable } from "node:stream";
import type { Request as ExpressRequest, Response as ExpressResponse } from "express";
import multer from "multer";
import { AppError } from "@/lib/errors";
import {
  FREE_SPACE_FLOOR_BYTES, MAX_CALL_BYTES, MAX_FIELD_BYTES, MAX_FIELDS_A_CALL, MAX_FILES_A_CALL, MAX_IMAGE_BYTES, MAX_PHOTO_BYTES, MAX_PHOTOS_A_CALL, MAX_REQUEST_BYTES, MAX_REQUEST_PHOTOS, MIB, REQUESTS_AT_ONCE, UPLOADS_IN_FLIGHT,
} from "@/lib/limits";
import { type Arrived, discard, freeBytes, receive } from "@/storage";

export interface Upload {
  files: { arrived: Arrived; fileName: string }[];
  /** each field's values in the order in which they came */
  fields: Map<string, string[]>;
}

/** What one kind of upload may bring. Bytes. */
export interface UploadLimits {
  /** "images", for sentences */
  what: string;
  fileBytes: number;
  tooLarge: string;
  files: number;
  callBytes: number;
  /** calls of this kind that may be under way at once */
  atOnce: number;
}

export const READS: UploadLimits = {
  what: "images", fileBytes: MAX_IMAGE_BYTES, tooLarge: "A file is larger than 64 MiB, the largest chip here. Nothing was stored; check what the reader saved.",
  files: MAX_FILES_A_CALL, callBytes: MAX_CALL_BYTES, atOnce: UPLOADS_IN_FLIGHT,
};
const PHOTO_TOO_LARGE = "A file is larger than 20 MiB. Nothing was stored; take the photo with a lower resolution, or send a smaller copy.";
export const PHOTOS: UploadLimits = {
  what: "photos", fileBytes: MAX_PHOTO_BYTES, tooLarge: PHOTO_TOO_LARGE, files: MAX_PHOTOS_A_CALL, callBytes: MAX_PHOTO_BYTES * MAX_PHOTOS_A_CALL, atOnce: 8,
};
/** By people without an account: never so many that the bench has to wait. */
export const REQUEST_PHOTOS: UploadLimits = { what: "photos", fileBytes: MAX_PHOTO_BYTES, tooLarge: PHOTO_TOO_LARGE, files: MAX_REQUEST_PHOTOS, callBytes: MAX_REQUEST_BYTES, atOnce: REQUESTS_AT_ONCE };

const SLACK = 1024 * 1024;
const refusals = ({ files, tooLarge }: UploadLimits): Record<string, [code: "too-large" | "malformed", detail: string]> => ({
  LIMIT_FILE_SIZE: ["too-large", tooLarge],
  LIMIT_FILE_COUNT: ["malformed", `At most ${files} files a call. Nothing was stored; send them in several calls.`],
  LIMIT_UNEXPECTED_FILE: ["malformed", `Files go into parts named file, at most ${files} a call. Nothing was stored.`],
});
const tooMuch = ({ callBytes }: UploadLimits) => new AppError("too-large", `A call carries at most ${callBytes / MIB} MiB. Nothing was stored; send fewer files a call.`);
const inFlight = new Map<UploadLimits, number>();

/** multer's storage engine: the store itself receives the stream, hashing while it writes. */
class IntoStore implements multer.StorageEngine {
  _handleFile(_request: unknown, file: Express.Multer.File, done: (error?: unknown, info?: Partial<Express.Multer.File>) => void): void {
    receive(file.stream).then((arrived) => done(null, { ...arrived, arrived } as Partial<Express.Multer.File>), done);
  }
  _removeFile(_request: unknown, file: Express.Multer.File, done: (error: Error | null) => void): void {
    discard(file).then(() => done(null), done);
  }
}

/** Ends the body once it passes the limit: multer itself would read a refused upload to its end. */
async function* capped(body: ReadableStream<Uint8Array>, limits: UploadLimits): AsyncGenerator<Uint8Array> {
  let size = 0;
  for await (const chunk of body as unknown as AsyncIterable<Uint8Array>) {
    size += chunk.length;
    if (size > limits.callBytes + SLACK) throw tooMuch(limits);
    yield chunk;
  }
}

/** Takes a multipart call into the store's incoming folder. Hostile input: every count and size has a limit. */
export async function takeUpload<T>(request: Request, run: (upload: Upload) => Promise<T>, limits = READS): Promise<T> {
  const type = request.headers.get("content-type") ?? "";
  if (!type.toLowerCase().startsWith("multipart/form-data")) throw new AppError("wrong-media-type", `Send the ${limits.what} as multipart/form-data, each as a part named file.`);
  if (!/boundary=/i.test(type)) throw new AppError("malformed", "The multipart boundary is missing. Let your program set the Content-Type itself.");
  if (request.headers.get("content-encoding")) throw new AppError("wrong-media-type", `Send the ${limits.what} without Content-Encoding.`);
  const declared = Number(request.headers.get("content-length") ?? 0);
  if (declared > limits.callBytes + SLACK) throw tooMuch(limits);
  if ((inFlight.get(limits) ?? 0) >= limits.atOnce) throw new AppError("too-many", "Many uploads are under way. Send again in a few seconds; nothing was stored.", { retryAfterSeconds: 5 });
  if ((await freeBytes()) < FREE_SPACE_FLOOR_BYTES + declared) throw new AppError("no-room", "The disk that holds the images is nearly full. Nothing was stored; free some space and send again.");
  inFlight.set(limits, (inFlight.get(limits) ?? 0) + 1);
  let upload: Upload | undefined;
  try {
    upload = await parse(request, limits);
    return await run(upload);
  } finally {
    inFlight.set(limits, inFlight.get(limits)! - 1);
    // what became an image is linked under its digest by now; what is still here belongs to nobody
    for (const file of upload?.files ?? []) await discard(file.arrived);
  }
}

const READ_OUT_MS = 10_000;

/** Reads what is left of a refused body and throws it away: up to the size of one image, and for some seconds. */
export async function readOut(request: Request): Promise<void> {
  if (!request.body || request.bodyUsed) return;
  const reader = request.body.getReader();
  const giveUp = () => void reader.cancel().catch(() => {});
  const timer = setTimeout(giveUp, READ_OUT_MS);
  let size = 0;
  try {
    for (let part = await reader.read(); !part.done; part = await reader.read()) {
      size += part.value.length;
      if (size > MAX_IMAGE_BYTES + SLACK) giveUp();
    }
  } catch {
    // the sender is gone: nobody waits for the answer
  } finally {
    clearTimeout(timer);
  }
}

async function parse(request: Request, limits: UploadLimits): Promise<Upload> {
  if (!request.body) throw new AppError("malformed", `The request has no body. Send 1 to ${limits.files} parts named file.`);
  const stream = Readable.from(capped(request.body, limits), { objectMode: false, highWaterMark: 256 * 1024 }) as Readable & {
    headers: Record<string, string>; files?: (Express.Multer.File & { arrived?: Arrived })[]; body?: Record<string, string | string[]>;
  };
  stream.headers = Object.fromEntries(request.headers);
  if (!stream.headers["content-length"]) stream.headers["transfer-encoding"] ??= "chunked";
  const run = multer({
    storage: new IntoStore(), defParamCharset: "utf8",
    // the name is evidence and kept as it came; no path is ever made of it
    preservePath: true,
    // fieldNestingDepth: a field called note[4294967290] would become a list of that length
    limits: { fileSize: limits.fileBytes, files: limits.files, fields: MAX_FIELDS_A_CALL, fieldSize: MAX_FIELD_BYTES, fieldNameSize: 100, parts: limits.files + MAX_FIELDS_A_CALL, headerPairs: 20, fieldNestingDepth: 0 },
  }).array("file", limits.files);
  const onAbort = () => stream.destroy(new Error("the sender went away"));
  request.signal.addEventListener("abort", onAbort, { once: true });
  try {
    await new Promise<void>((resolve, reject) => {
      stream.on("error", reject);
      run(stream as unknown as ExpressRequest, {} as ExpressResponse, (error?: unknown) => (error ? reject(error) : resolve()));
    });
  } catch (error) {
    // what broke off within a file leaves an entry that never arrived
    for (const file of stream.files ?? []) if (file.arrived) await discard(file.arrived);
    throw refusal(error, limits);
  } finally {
    request.signal.removeEventListener("abort", onAbort);
    if (!stream.readableEnded) stream.destroy();
  }
  const fields = new Map(Object.entries(stream.body ?? {}).map(([name, value]) => [name, Array.isArray(value) ? value.map(String) : [String(value)]]));
  return { files: (stream.files ?? []).map((file) => ({ arrived: file.arrived!, fileName: file.originalname })), fields };
}

function refusal(error: unknown, limits: UploadLimits): unknown {
  if (error instanceof AppError) return error;
  if (error instanceof multer.MulterError) {
    const [code, detail] = refusals(limits)[error.code] ?? ["malformed", `The upload has too many or too long parts (${error.message}). Nothing was stored.`];
    return new AppError(code, detail);
  }
  const fault = error as NodeJS.ErrnoException;
  if (fault.code === "ENOSPC" || fault.code === "EIO" || fault.code?.startsWith("ER_")) return error;
  return new AppError("malformed", "The upload broke off or is not well-formed multipart. Nothing was stored; send it again.");
}
