import { createHash } from "node:crypto";

/** SHA-256 of a token; only this is stored. */
export function tokenHash(token: string): Buffer {
  return createHash("sha256").update(token).digest();
}
