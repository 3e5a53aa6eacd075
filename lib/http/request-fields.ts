import { AppError } from "@/lib/errors";
import { type RequestAnswers, type RequestInput, requestInput } from "@/lib/schemas/request";
import { parse } from "./handler";
import type { Upload } from "./upload";

/** The text fields of a customer's request: one value each. What programs fill in ends here. */
export function requestFieldsOf(upload: Upload): { answers: RequestAnswers; stamp: string } {
  const given: Record<string, unknown> = {};
  for (const [name, values] of upload.fields) {
    if (values.length > 1) throw new AppError("does-not-fit", "A field came twice. Send each once.", { errors: [{ path: name.slice(0, 40), message: "Send it once." }] });
    given[name] = values[0];
  }
  const { website, stamp, ...answers }: RequestInput = parse(requestInput, given);
  if (website !== "") {
    const message = "A field that people don’t see was filled in, as programs do. Load the page again and send without it.";
    throw new AppError("does-not-fit", message, { errors: [{ path: "website", message }] });
  }
  return { answers, stamp };
}
