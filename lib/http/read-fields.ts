import { AppError } from "@/lib/errors";
import { type ReadFields, readFields } from "@/lib/schemas/read";
import { parse } from "./handler";
import type { Upload } from "./upload";

const LISTS = new Set(["sha256", "modifiedAt", "takenAt"]);

/** The text fields of an upload as the schema wants them: one value each, the per-file ones as lists. */
export function readFieldsOf(upload: Upload): ReadFields {
  const input: Record<string, unknown> = {};
  for (const [name, values] of upload.fields) {
    if (LISTS.has(name)) input[name] = values;
    else if (values.length === 1) input[name] = values[0];
    else throw new AppError("does-not-fit", `The field ${name} came ${values.length} times. Send it once.`, { errors: [{ path: name, message: "Send it once." }] });
  }
  return parse(readFields, input);
}
