import { readFile } from "node:fs/promises";
import { importShelf } from "@/lib/commands/import-shelf";
import { allow } from "@/lib/commands/refuse";
import { MAX_SHELF_FILE_BYTES } from "@/lib/core/shelf";
import { AppError } from "@/lib/errors";
import { parse } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import type { UploadLimits } from "@/lib/http/upload";
import { uploadHandler } from "@/lib/http/upload-handler";
import { importFields } from "@/lib/schemas/shelf";

const ONE_FILE: UploadLimits = {
  what: "CSV file", fileBytes: MAX_SHELF_FILE_BYTES, tooLarge: "The file is larger than 10 MiB. Nothing was changed; split it, with the header row in each part.", files: 1, callBytes: MAX_SHELF_FILE_BYTES, atOnce: 2,
};

/** One CSV file, and a field `try` (yes: only say what each line would do; no: do it). Nothing of the file itself is kept. */
export const POST = uploadHandler(
  { status: 200, changes: true, limits: ONE_FILE, before: async (actor) => allow(actor, "shelf.change") },
  async ({ actor, upload }) => {
    const [file] = upload.files;
    if (!file) throw new AppError("malformed", "No file came with the request. Send one part named file.");
    const fields = parse(importFields, Object.fromEntries([...upload.fields].map(([name, values]) => [name, values[0]])));
    return importShelf(actor, { bytes: await readFile(file.arrived.path), fileName: file.fileName, tryOnly: fields.try === "yes", reason: fields.reason ?? null });
  },
);
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
