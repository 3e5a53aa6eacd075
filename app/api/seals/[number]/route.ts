import { notFound } from "@/lib/commands/refuse";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { sealByNumber } from "@/lib/queries/seals";
import { type SealFile, sealFileInput } from "@/lib/schemas/seal";
import type { SealView } from "@/lib/views";

/** The names under which a bundle holds them too. */
const FILES: Record<SealFile, { name: string; type: string; bytes: (seal: SealView) => Buffer<ArrayBuffer> | null }> = {
  text: { name: "seal.txt", type: "text/plain; charset=utf-8", bytes: (seal) => Buffer.from(seal.text) },
  signature: { name: "seal.sig", type: "application/octet-stream", bytes: (seal) => Buffer.from(seal.signature, "base64") },
  key: { name: "seal-key.pem", type: "application/x-pem-file", bytes: (seal) => (seal.key === null ? null : Buffer.from(seal.key)) },
};

export const GET = handler({ input: sealFileInput }, async ({ actor, params, input }) => {
  const seal = await sealByNumber(actor, params.number);
  if (!input.file) return seal;
  const { name, type, bytes } = FILES[input.file];
  const body = bytes(seal);
  if (!body) throw notFound("key");
  return new Response(body, { headers: { "content-type": type, "content-length": String(body.length), "content-disposition": `attachment; filename="${name}"` } });
});
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
