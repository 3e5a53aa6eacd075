import { createHash } from "node:crypto";
import { env } from "@/lib/env";
import { openApiDocument } from "./document";

let made: { text: string; etag: string } | null = null;

/** Made once, then the same bytes for everybody. */
function described(): { text: string; etag: string } {
  if (made) return made;
  const text = JSON.stringify(openApiDocument(env().appVersion));
  made = { text, etag: `"${createHash("sha256").update(text).digest("hex").slice(0, 32)}"` };
  return made;
}

/** The interface's description, for anyone. Holds nothing of this workshop. */
export function serveDescription(request: Request): Response {
  const { text, etag } = described();
  // how long it may be kept stands in next.config.mjs, whose headers come last
  const headers = { etag };
  if (request.headers.get("if-none-match") === etag) return new Response(null, { status: 304, headers });
  return new Response(text, { headers: { ...headers, "content-type": "application/json" } });
}
