import { Readable } from "node:stream";
import { openHandedOut } from "@/lib/commands/hand-out-image";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { handOutInput } from "@/lib/schemas/read";

// `secret`: the bytes are kept under no Idempotency-Key. Asked again they leave again, and that is written down again
export const POST = handler({ input: handOutInput, secret: true }, async ({ actor, params, input }) => {
  const { fileSha256, fileBytes, fileName, stream } = await openHandedOut(actor, params.id, input);
  return new Response(Readable.toWeb(stream) as ReadableStream, {
    headers: {
      "content-type": "application/octet-stream",
      "content-length": String(fileBytes),
      "content-disposition": `attachment; filename="${fileName}"`,
      // RFC 9530: the digest as a structured-field byte sequence
      "repr-digest": `sha-256=:${Buffer.from(fileSha256, "hex").toString("base64")}:`,
    },
  });
});
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
