import { createHash } from "node:crypto";
import { Op, QueryTypes } from "sequelize";
import { isAllowedOnClosed } from "@/lib/core/closing";
import { type Action, ACTIONS, type Facts } from "@/lib/core/custody-actions";
import { type CustodyBody, custodyText, signedBytes, ZERO_HASH } from "@/lib/core/custody";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { MAX_CUSTODY_BODY_BYTES } from "@/lib/limits";
import { connection, CustodyEntry, CustodyHead, type Transaction } from "@/models";
import { logKey } from "@/storage";

export interface Subject {
  type: "workshop" | "case" | "drive" | "board" | "chip" | "read" | "approval" | "transfer" | "share" | "image" | "user" | "token" | "policy" | "key" | "bundle" | "seal" | "item" | "request" | "photo" | "shelf-board" | "note";
  id: string;
}

interface Head {
  seq: number;
  hash: Buffer;
  at: string;
  /** where the head stood when somebody had turned it back behind the last entry */
  behind?: number;
}

/** Locks the chain's head until the transaction ends: the first statement of every command on a drive. */
export async function lockChain(tx: Transaction, chain: string): Promise<Head> {
  const locked = await selectHead(tx, chain);
  if (locked) return atItsEnd(tx, chain, locked);
  await connection().query(
    "INSERT IGNORE INTO custody_heads (chain_id, seq, hash, at) VALUES (?, 0, ?, '1970-01-01T00:00:00.000000Z')",
    { replacements: [chain, Buffer.from(ZERO_HASH, "hex")], transaction: tx },
  );
  return atItsEnd(tx, chain, (await selectHead(tx, chain))!);
}

/** A head that was turned back does not stop the log: the next entry follows the last one that there is, and says so. */
async function atItsEnd(tx: Transaction, chain: string, head: Head): Promise<Head> {
  const last = await CustodyEntry.findOne({ where: { chainId: chain, seq: { [Op.gt]: head.seq } }, order: [["seq", "DESC"]], transaction: tx });
  // the digest of what is there, not the one beside it: a stranger's row could carry one that is taken, and stop the log
  return last ? { seq: last.seq, hash: createHash("sha256").update(last.body).digest(), at: atOf(last.body) ?? head.at, behind: head.seq } : head;
}

function atOf(body: Buffer): string | null {
  try {
    const { at } = JSON.parse(body.toString("utf8")) as { at?: unknown };
    return typeof at === "string" ? at : null;
  } catch {
    return null;
  }
}

async function selectHead(tx: Transaction, chain: string): Promise<Head | undefined> {
  const [head] = await connection().query<Head>("SELECT seq, hash, at FROM custody_heads WHERE chain_id = ? FOR UPDATE", {
    replacements: [chain], transaction: tx, type: QueryTypes.SELECT,
  });
  return head;
}

/** The one place that keeps a closed case as it is: every change of it is an entry, and closing takes the same lock. */
async function refuseOnClosed(tx: Transaction, chain: string): Promise<void> {
  const [closed] = await connection().query<{ ref: string }>(
    "SELECT cases.ref FROM drives JOIN cases ON cases.id = drives.case_id WHERE drives.id = ? AND cases.closed_at IS NOT NULL",
    { replacements: [chain], transaction: tx, type: QueryTypes.SELECT },
  );
  if (closed) throw new AppError("rule-against", `Case ${closed.ref} is closed. Reopen it first; then make the change.`);
}

/**
 * Appends one entry to a chain, in the transaction of the change itself (CUSTODY.md, "Append"): lock, build the
 * canonical body, sign, insert, move the head. If the entry cannot be written the change does not happen.
 */
export async function appendEntry<A extends Action>(
  tx: Transaction, chain: string, actor: Actor, action: A, subject: Subject, facts: Facts<A>,
): Promise<{ seq: number; hash: string }> {
  const head = await lockChain(tx, chain);
  if (actor.role !== "system" && chain !== WORKSHOP_CHAIN && !isAllowedOnClosed(action)) await refuseOnClosed(tx, chain);
  const [{ now }] = await connection().query<{ now: string }>(
    "SELECT DATE_FORMAT(UTC_TIMESTAMP(6), '%Y-%m-%dT%H:%i:%s.%fZ') AS now", { transaction: tx, type: QueryTypes.SELECT },
  );
  const clockBehindMs = now < head.at ? Math.ceil(Date.parse(head.at) - Date.parse(now)) : undefined;
  const parsed = ACTIONS[action].facts.parse({ ...facts, clockBehindMs, headBehind: head.behind });
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
  await CustodyEntry.create({
    chainId: chain, seq, body: bytes, hash, prev: head.hash, keyId: key.keyId, signature: key.sign(signedBytes(bytes)), action,
  }, { transaction: tx });
  await CustodyHead.update({ seq, hash, at: body.at }, { where: { chainId: chain }, transaction: tx });
  return { seq, hash: hash.toString("hex") };
}
