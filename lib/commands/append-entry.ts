import { createHash } from "node:crypto";
import { QueryTypes, UniqueConstraintError } from "sequelize";
import { type Action, ACTIONS, type Facts } from "@/lib/core/custody-actions";
import { type CustodyBody, custodyText, signedBytes, ZERO_HASH } from "@/lib/core/custody";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { MAX_CUSTODY_BODY_BYTES } from "@/lib/limits";
import { connection, CustodyEntry, CustodyHead, type Transaction } from "@/models";
import { logKey } from "@/storage";

export interface Subject {
  type: "case" | "drive" | "board" | "chip" | "read" | "approval" | "transfer" | "share" | "image" | "user" | "token" | "policy" | "key" | "bundle";
  id: string;
}

interface Head {
  seq: number;
  hash: Buffer;
  at: string;
}

const HEAD_BEHIND = "This custody log holds more entries than its head says, so nothing can be added. Run the check of the store and put the database back from a backup.";

/** Locks the chain's head until the transaction ends: the first statement of every command on a drive. */
export async function lockChain(tx: Transaction, chain: string): Promise<Head> {
  const locked = await selectHead(tx, chain);
  if (locked) return locked;
  await connection().query(
    "INSERT IGNORE INTO custody_heads (chain_id, seq, hash, at) VALUES (?, 0, ?, '1970-01-01T00:00:00.000000Z')",
    { replacements: [chain, Buffer.from(ZERO_HASH, "hex")], transaction: tx },
  );
  return (await selectHead(tx, chain))!;
}

async function selectHead(tx: Transaction, chain: string): Promise<Head | undefined> {
  const [head] = await connection().query<Head>("SELECT seq, hash, at FROM custody_heads WHERE chain_id = ? FOR UPDATE", {
    replacements: [chain], transaction: tx, type: QueryTypes.SELECT,
  });
  return head;
}

/**
 * Appends one entry to a chain, in the transaction of the change itself (CUSTODY.md, "Append"): lock, build the
 * canonical body, sign, insert, move the head. If the entry cannot be written the change does not happen.
 */
export async function appendEntry<A extends Action>(
  tx: Transaction, chain: string, actor: Actor, action: A, subject: Subject, facts: Facts<A>,
): Promise<{ seq: number; hash: string }> {
  const head = await lockChain(tx, chain);
  const [{ now }] = await connection().query<{ now: string }>(
    "SELECT DATE_FORMAT(UTC_TIMESTAMP(6), '%Y-%m-%dT%H:%i:%s.%fZ') AS now", { transaction: tx, type: QueryTypes.SELECT },
  );
  const clockBehindMs = now < head.at ? Math.ceil(Date.parse(head.at) - Date.parse(now)) : undefined;
  const parsed = ACTIONS[action].facts.parse(clockBehindMs === undefined ? facts : { ...facts, clockBehindMs });
  // an absent optional fact is left out, never written as undefined
  const checked = JSON.parse(JSON.stringify(parsed)) as Record<string, unknown>;
  const seq = head.seq + 1;
  const body: CustodyBody = {
    v: 1, drive: chain, seq, at: clockBehindMs === undefined ? now : head.at, app: env().appVersion,
    actor: { id: actor.id, name: actor.name, role: actor.role }, action, subject, facts: checked, prev: head.hash.toString("hex"),
  };
  const bytes = Buffer.from(custodyText(body), "utf8");
  if (bytes.length > MAX_CUSTODY_BODY_BYTES) throw new Error(`custody body of ${bytes.length} bytes is above the limit`);
  const hash = createHash("sha256").update(bytes).digest();
  const key = logKey();
  try {
    await CustodyEntry.create({
      chainId: chain, seq, body: bytes, hash, prev: head.hash, keyId: key.keyId, signature: key.sign(signedBytes(bytes)), action,
    }, { transaction: tx });
  } catch (error) {
    // the head is locked: a place that is taken already means that somebody turned the head back
    if (error instanceof UniqueConstraintError) throw new AppError("rule-against", HEAD_BEHIND);
    throw error;
  }
  await CustodyHead.update({ seq, hash, at: body.at }, { where: { chainId: chain }, transaction: tx });
  return { seq, hash: hash.toString("hex") };
}
