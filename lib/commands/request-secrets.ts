import { createHmac, timingSafeEqual } from "node:crypto";
import { addressGroup } from "@/lib/core/address-group";
import { readSecret } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { REQUEST_FILL_SECONDS, REQUEST_FORM_HOURS } from "@/lib/limits";

/** A digest under this workshop's own key: what is stored tells nothing to who has only the database. */
function keyed(use: string, parts: readonly (string | Buffer)[]): Buffer {
  const hash = createHmac("sha256", Buffer.from(readSecret("outbox-key"), "hex")).update(`twinread-request/1 ${use}\n`);
  for (const part of parts) hash.update(`${part.length}:`).update(part);
  return hash.digest();
}

/** Under what requests from one place are counted: the address itself is kept nowhere. */
export const addressDigest = (address: string): Buffer => keyed("address", [addressGroup(address)]);

/**
 * The private link's secret for a request that came with an Idempotency-Key: made again from the same key and the same
 * request, and from nothing that is stored, so that a repeated request is answered with the link of the first.
 */
export const tokenFor = (idempotencyKey: string, request: Buffer): string => keyed("link", [idempotencyKey, request]).toString("base64url");

/** The key as the receipts keep it: without the key itself the link can't be made again. */
export const keptKey = (idempotencyKey: string): string => keyed("receipt", [idempotencyKey]).toString("base64url");

const mark = (made: string) => keyed("form", [made]).subarray(0, 16).toString("base64url");

/** When the form was made, so that the server knows it again: goes along with the answers. */
export function formStamp(now = Date.now()): string {
  const made = now.toString(36);
  return `${made}.${mark(made)}`;
}

/** Refuses a form that no page of ours made, one that is days old, and one that was filled in faster than anyone types. */
export function checkStamp(stamp: string, now = Date.now()): void {
  const [made = "", sign = "", more] = stamp.split(".");
  const expected = Buffer.from(mark(made));
  const given = Buffer.from(sign);
  const seconds = (now - parseInt(made, 36)) / 1000;
  const known = more === undefined && /^[0-9a-z]{6,12}$/.test(made) && given.length === expected.length && timingSafeEqual(given, expected);
  if (!known || seconds < -60 || seconds > REQUEST_FORM_HOURS * 3600) {
    throw new AppError("does-not-fit", "This form is too old, or not from our page. Load the page again; what you typed stays. Then send.", { errors: [{ path: "stamp", message: "Load the page again." }] });
  }
  if (seconds < REQUEST_FILL_SECONDS) {
    throw new AppError("too-many", "That was faster than anyone types. Wait a few seconds, then send again.", { retryAfterSeconds: REQUEST_FILL_SECONDS });
  }
}
