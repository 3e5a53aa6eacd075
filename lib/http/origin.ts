import { AppError } from "@/lib/errors";
import { env } from "@/lib/env";

/**
 * A change that comes with a cookie must come from our own pages: `Sec-Fetch-Site: same-origin`, or, where the browser
 * does not send that, an `Origin` that is ours. A bench token needs neither (API.md).
 */
export function checkOrigin(request: Request): void {
  if (request.method === "GET" || request.method === "HEAD") return;
  if (request.headers.has("authorization")) return;
  const site = request.headers.get("sec-fetch-site");
  if (site === "same-origin") return;
  if (site === null) {
    const origin = request.headers.get("origin");
    if (origin !== null && origin === new URL(env().publicUrl).origin) return;
  }
  throw new AppError("forbidden", "This change did not come from Twinread's own pages. Open Twinread itself and try there, or use a bench token.");
}
