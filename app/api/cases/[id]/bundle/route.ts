import { Readable } from "node:stream";
import { makeBundle } from "@/lib/commands/make-bundle";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";

// `secret`: an archive is never answered from what is kept under an Idempotency-Key; each request makes a new one
export const POST = handler({ secret: true }, async ({ actor, params, request }) => {
  const { fileName, stream } = await makeBundle(actor, params.id);
  if (request.signal.aborted) stream.destroy();
  request.signal.addEventListener("abort", () => stream.destroy(), { once: true });
  return new Response(Readable.toWeb(stream) as ReadableStream, {
    headers: { "content-type": "application/zip", "content-disposition": `attachment; filename="${fileName}"` },
  });
});
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
