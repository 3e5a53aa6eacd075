import { createHash } from "node:crypto";
import { UniqueConstraintError } from "sequelize";
import { AppError } from "@/lib/errors";
import { IDEMPOTENCY_DAYS } from "@/lib/limits";
import { IdempotencyKey, withReceipt } from "@/models";

const STARTED_AT = Date.now() - process.uptime() * 1000;

export interface Answer {
  status: number;
  body: unknown;
}

/** SHA-256 over what makes two requests the same: method, path and the body (or the digests of its files). */
export function requestHash(parts: (string | Uint8Array)[]): Buffer {
  const hash = createHash("sha256");
  for (const part of parts) hash.update(`${part.length}:`).update(part);
  return hash.digest();
}

/**
 * Runs a change once for a key of this user and route. The receipt is written in the change's own transaction, so a
 * server that dies before it could answer still answers the repeated request without changing anything twice.
 */
export async function once(
  userId: string, route: string, key: string | null, hash: Buffer, status: number, run: () => Promise<unknown>,
): Promise<Answer> {
  if (key === null) return { status, body: await run() };
  if (key.length === 0 || key.length > 200) throw new AppError("malformed", "An Idempotency-Key has 1 to 200 characters.");
  const where = { userId, route, idempotencyKey: key };
  const known = await claim(where, hash);
  if (known) return known;
  try {
    const body = await withReceipt(async (tx, result) => {
      await IdempotencyKey.update({ status, answer: JSON.stringify(result ?? null) }, { where, transaction: tx });
    }, run);
    await IdempotencyKey.update({ status, answer: JSON.stringify(body ?? null) }, { where });
    return { status, body };
  } catch (error) {
    await IdempotencyKey.destroy({ where: { ...where, status: null } });
    throw error;
  }
}

async function claim(where: { userId: string; route: string; idempotencyKey: string }, hash: Buffer): Promise<Answer | null> {
  for (let attempt = 0; attempt < 2; attempt += 1) {
    try {
      await IdempotencyKey.create({ ...where, requestHash: hash, createdAt: new Date() });
      return null;
    } catch (error) {
      if (!(error instanceof UniqueConstraintError)) throw error;
    }
    const row = await IdempotencyKey.findOne({ where });
    if (!row) continue;
    const age = Date.now() - row.createdAt.getTime();
    if (age > IDEMPOTENCY_DAYS * 86_400_000) {
      await row.destroy();
      continue;
    }
    if (!row.requestHash.equals(hash)) {
      throw new AppError("does-not-fit", "This Idempotency-Key was used for another request. Use a new key for a new request.");
    }
    if (row.status !== null) return { status: row.status, body: JSON.parse(row.answer ?? "null") };
    // A claim from before this server started belongs to a request that died before it changed anything.
    if (row.createdAt.getTime() < STARTED_AT) {
      await IdempotencyKey.destroy({ where: { ...where, status: null } });
      continue;
    }
    throw new AppError("rule-against", "The same request is still under way. Wait for its answer.", { retryAfterSeconds: 2 });
  }
  throw new AppError("unavailable", "The request could not be claimed. Try again in a moment.", { retryAfterSeconds: 2 });
}
