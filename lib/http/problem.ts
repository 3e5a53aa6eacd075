import { AppError, type ErrorCode, type FieldError, STATUS, TITLE } from "@/lib/errors";
import { isDatabaseAway } from "@/models";

/** RFC 9457 problem details. */
export function problem(code: ErrorCode, detail: string, extra: { errors?: FieldError[]; retryAfterSeconds?: number } = {}): Response {
  const headers: Record<string, string> = { "content-type": "application/problem+json" };
  if (extra.retryAfterSeconds) headers["retry-after"] = String(extra.retryAfterSeconds);
  if (code === "not-signed-in") headers["www-authenticate"] = 'Bearer realm="Twinread"';
  const body = { type: "about:blank", title: TITLE[code], status: STATUS[code], detail, ...(extra.errors ? { errors: extra.errors } : {}) };
  return new Response(JSON.stringify(body), { status: STATUS[code], headers });
}

/** The one map from what was thrown to an answer. Anything unknown is logged here and leaves as a bare 500. */
export function answerTo(error: unknown): Response {
  if (error instanceof AppError) return problem(error.code, error.detail, error.extra);
  if (isDatabaseAway(error)) {
    return problem("unavailable", "The database can't be reached right now. Nothing was changed; try again in a moment.", { retryAfterSeconds: 5 });
  }
  const code = (error as { code?: string } | undefined)?.code;
  if (code === "ENOSPC" || code === "EDQUOT") return problem("no-room", "The disk is full. Nothing was stored; free some space and try again.");
  // Next steers redirects and not-found pages by throwing; those are its own to handle.
  if (typeof (error as { digest?: unknown } | undefined)?.digest === "string") throw error;
  console.error("unexpected:", error);
  return problem("internal", "Nothing was half-done. If it happens again, tell whoever runs this server and give the time.");
}
