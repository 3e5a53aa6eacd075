import { createHash } from "node:crypto";
import { QueryTypes } from "sequelize";
import { signedBytes, ZERO_HASH } from "@/lib/core/custody";
import type { Keyring } from "@/lib/core/keyring";
import { inLeafOrder, leafText, parseSeal, type SealLeaf, sealRoot, sealText } from "@/lib/core/seal";
import { type Actor, type SealCause, WORKSHOP_CHAIN } from "@/lib/core/words";
import { connection, CustodyEntry, inTransaction, Seal, type Transaction } from "@/models";
import { sealKey, verifySignature } from "@/storage";
import { appendEntry, lockChain } from "./append-entry";
import { mailSeal } from "./mail-seal";
import { allow } from "./refuse";
import { settleKeys } from "./settle-keys";
import { witnessSeals } from "./witness-seals";

export interface MadeSeal {
  number: number;
  /** the signed text, six lines */
  text: string;
  /** base64 */
  signature: string;
  keyId: string;
  /** SHA-256 of the text, lower-case hex */
  sha256: string;
}

/** Makes a seal over where every chain stands now; two at once give two that follow one another. */
export async function makeSeal(actor: Actor, cause: SealCause, tx?: Transaction): Promise<MadeSeal> {
  if (cause === "asked") allow(actor, "seal.make");
  const make = async (within: Transaction) => (await sealNow(within, actor, cause)).seal;
  return tx ? make(tx) : inTransaction(make);
}

/**
 * The seal and the leaves under its root, in the caller's transaction: what that has appended is in it. `now` is the
 * database's clock unless a test says otherwise.
 */
export async function sealNow(tx: Transaction, actor: Actor, cause: SealCause, now?: string): Promise<{ seal: MadeSeal; leaves: SealLeaf[] }> {
  const workshop = await lockChain(tx, WORKSHOP_CHAIN);
  const ring = await settleKeys(tx);
  const last = await lastSeal(tx, ring);
  const leaves = inLeafOrder(await heads(tx));
  const at = [now ?? (await databaseNow(tx)), workshop.at, last.at].sort().at(-1)!;
  const root = sealRoot(leaves, sha256);
  const number = last.number + 1;
  const text = sealText({ number, at, chains: leaves.length, root, prev: last.sha256 });
  const key = sealKey();
  const bytes = Buffer.from(text);
  const digest = sha256(bytes);
  const signature = key.sign(bytes);
  await connection().query(
    `INSERT INTO seals (number, text, sha256, prev, key_id, signature, cause, made_at, chains, leaves) VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?)`,
    {
      replacements: [number, bytes, digest, Buffer.from(last.sha256, "hex"), key.keyId, signature, cause, at.slice(0, -1).replace("T", " "), leaves.length, Buffer.from(leaves.map((leaf) => `${leafText(leaf)}\n`).join(""))],
      transaction: tx,
    },
  );
  const seal: MadeSeal = { number, text, signature: signature.toString("base64"), keyId: key.keyId, sha256: digest.toString("hex") };
  await appendEntry(tx, WORKSHOP_CHAIN, actor, "seal.made", { type: "seal", id: WORKSHOP_CHAIN }, {
    number, sha256: seal.sha256, root, chains: leaves.length, keyId: key.keyId, cause,
  });
  if (cause === "daily" || cause === "asked") await mailSeal(tx, seal);
  // a witness file that can't be written never stops a seal: nobody waits for it
  tx.afterCommit(() => void witnessSeals());
  return { seal, leaves };
}

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest();

export async function databaseNow(tx: Transaction): Promise<string> {
  const [{ now }] = await connection().query<{ now: string }>("SELECT DATE_FORMAT(UTC_TIMESTAMP(6), '%Y-%m-%dT%H:%i:%s.%fZ') AS now", { transaction: tx, type: QueryTypes.SELECT });
  return now;
}

/** Every head in one statement: one look, in which each chain stands where some transaction left it. */
function heads(tx: Transaction): Promise<SealLeaf[]> {
  return connection().query<SealLeaf>("SELECT chain_id AS drive, LOWER(HEX(hash)) AS head, seq FROM custody_heads WHERE seq > 0", { transaction: tx, type: QueryTypes.SELECT });
}

interface Last {
  number: number;
  sha256: string;
  at: string;
}

/**
 * The seal that the new one follows. Where rows were taken away the log still tells of it: the number goes on, so that
 * no two different seals ever bear the same one.
 */
async function lastSeal(tx: Transaction, ring: Keyring): Promise<Last> {
  const row = await Seal.findOne({ attributes: ["number", "sha256", "text"], order: [["number", "DESC"]], transaction: tx });
  const stored = row && { number: row.number, sha256: row.sha256.toString("hex"), at: parseSeal(row.text.toString("utf8"))?.at ?? "" };
  const told = await toldByLog(tx, ring);
  const last = told && told.number > (stored?.number ?? 0) ? told : stored;
  return last ?? { number: 0, sha256: ZERO_HASH, at: "" };
}

/** entries that somebody may have put on top; only a signed one counts */
const LOOK_BACK = 20;

async function toldByLog(tx: Transaction, { keys }: Keyring): Promise<Last | null> {
  const rows = await CustodyEntry.findAll({ where: { chainId: WORKSHOP_CHAIN, action: "seal.made" }, order: [["seq", "DESC"]], limit: LOOK_BACK, transaction: tx });
  const entry = rows.find((row) => verifySignature(keys.get(row.keyId) ?? "", signedBytes(row.body), row.signature));
  if (!entry) return null;
  const { at, facts } = JSON.parse(entry.body.toString("utf8")) as { at: string; facts: { number: number; sha256: string } };
  return { number: facts.number, sha256: facts.sha256, at };
}
