import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { readBytes } from "@/lib/queries/read-bytes";
import { bytesInput } from "@/lib/schemas/read";

export const GET = handler({ input: bytesInput }, async ({ actor, params, input }) =>
  new Response(new Uint8Array(await readBytes(actor, params.id, input)), { headers: { "content-type": "application/octet-stream" } }));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
