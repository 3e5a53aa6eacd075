import { type NextRequest, NextResponse } from "next/server";

/**
 * Sets the pages' content security policy with a fresh nonce. It decides nothing: who may see what is asked in every
 * page and route. It must never match /api: Next would buffer and cut uploads that pass through a proxy.
 */
export function proxy(request: NextRequest): NextResponse {
  const nonce = btoa(String.fromCharCode(...crypto.getRandomValues(new Uint8Array(18))));
  const dev = process.env.NODE_ENV === "development";
  const policy = [
    "default-src 'self'",
    `script-src 'nonce-${nonce}' 'strict-dynamic'${dev ? " 'unsafe-eval'" : ""}`,
    "style-src 'self' 'unsafe-inline'",
    "img-src 'self' blob: data:",
    "worker-src 'self' blob:",
    `connect-src 'self'${dev ? " ws:" : ""}`,
    "object-src 'none'", "base-uri 'none'", "form-action 'self'", "frame-ancestors 'none'",
  ].join("; ");
  const headers = new Headers(request.headers);
  // Whatever the client sent under these names is replaced: Next takes the nonce from the request's policy.
  headers.set("content-security-policy", policy);
  headers.set("x-nonce", nonce);
  headers.set("x-twinread-path", request.nextUrl.pathname + request.nextUrl.search);
  const response = NextResponse.next({ request: { headers } });
  response.headers.set("content-security-policy", policy);
  response.headers.set("cache-control", "no-store");
  if (process.env.PUBLIC_URL?.startsWith("https:")) response.headers.set("strict-transport-security", "max-age=31536000; includeSubDomains");
  return response;
}

export const config = { matcher: ["/((?!api/|_next/static/|icon\\.svg|favicon\\.ico|openapi\\.json).*)"] };
