import { Readable } from "node:stream";
import { openOriginal, openReduced } from "@/lib/commands/photo-open";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { photoInput } from "@/lib/schemas/photo";

const SAFE = { "x-content-type-options": "nosniff", "content-security-policy": "default-src 'none'; frame-ancestors 'none'; sandbox" };

/** The original only ever as a file to save; in a page stands the copy that was drawn anew. */
export const GET = handler({ input: photoInput }, async ({ actor, params, input }) => {
  if (input.reduced !== undefined) {
    const { bytes, fileName } = await openReduced(actor, params.id, input.reduced);
    return new Response(new Uint8Array(bytes), {
      headers: { ...SAFE, "content-type": "image/jpeg", "content-length": String(bytes.length), "content-disposition": `inline; filename="${fileName}"` },
    });
  }
  const { sha256, sizeBytes, mediaType, fileName, stream } = await openOriginal(actor, params.id);
  return new Response(Readable.toWeb(stream) as ReadableStream, {
    headers: {
      ...SAFE, "content-type": mediaType, "content-length": String(sizeBytes), "content-disposition": `attachment; filename="${fileName}"`,
      // RFC 9530: the digest as a structured-field byte sequence
      "repr-digest": `sha-256=:${Buffer.from(sha256, "hex").toString("base64")}:`,
    },
  });
});
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
