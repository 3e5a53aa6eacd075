import { serveDescription } from "@/lib/http/openapi/serve";
import { othersThan } from "@/lib/http/others-than";

export function GET(request: Request): Response {
  return serveDescription(request);
}
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
