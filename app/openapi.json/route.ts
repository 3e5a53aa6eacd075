import { serveDescription } from "@/lib/http/openapi/serve";
import { othersThan } from "@/lib/http/others-than";

/** Where programs look for it first; the interface's own address is /api/openapi.json. */
export function GET(request: Request): Response {
  return serveDescription(request);
}
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
