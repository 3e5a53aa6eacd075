import { allow } from "@/lib/commands/refuse";
import { handler } from "@/lib/http/handler";
import { uploadHandler } from "@/lib/http/upload-handler";
import { findDigest } from "@/lib/queries/find";
import { AppError } from "@/lib/errors";
import { othersThan } from "@/lib/http/others-than";
import { findInput } from "@/lib/schemas/read";

export const GET = handler({ input: findInput }, ({ actor, input }) => findDigest(actor, input.digest));

/** The file is hashed on its way and thrown away: nothing is stored by asking. */
export const POST = uploadHandler(
  { status: 200, changes: false, before: async (actor) => allow(actor, "find.ask") },
  async ({ actor, upload }) => {
    const [file] = upload.files;
    if (!file) throw new AppError("malformed", "No file came with the request. Send one part named file.");
    return { sha256: file.arrived.sha256, ...(await findDigest(actor, file.arrived.sha256)) };
  },
);
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
