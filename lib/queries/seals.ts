import { createHash } from "node:crypto";
import { Op, QueryTypes } from "sequelize";
import { driveFor } from "@/lib/commands/place";
import { allow, notFound } from "@/lib/commands/refuse";
import { parseSeal, type SealLeaf, sealProof } from "@/lib/core/seal";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { DriveProofView, ListView, SealRow, SealView } from "@/lib/views";
import { connection, CustodyEntry, Seal, type Transaction } from "@/models";
import { verifySignature } from "@/storage";
import { keyring } from "./keyring";

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest();
/** the leaves of a workshop with many drives are large: read only where a proof is made */
const WITHOUT_LEAVES = { exclude: ["leaves"] };

/** PEM of every key that seals may be signed with, by its id, oldest first. */
export async function sealKeys(tx?: Transaction): Promise<Map<string, string>> {
  const rows = await CustodyEntry.findAll({ where: { chainId: WORKSHOP_CHAIN, action: "key.introduced" }, order: ["seq"], transaction: tx });
  return keyring(rows, null).sealKeys;
}

/** Number and digest of the newest seal; null before the first. */
export async function newestSeal(tx?: Transaction): Promise<{ number: number; sha256: string } | null> {
  const row = await Seal.findOne({ attributes: ["number", "sha256"], order: [["number", "DESC"]], transaction: tx });
  return row && { number: row.number, sha256: row.sha256.toString("hex") };
}

/** how many seals of summaries are looked into: the one that is meant is made with its entry */
const LOOK_INTO = 3;

/** The seal of a summary whose leaves hold this head; `since` is when the head's entry was written. */
export async function sealOver(head: string, since: string): Promise<{ number: number; sha256: string; keyId: string } | null> {
  const near = await Seal.findAll({
    attributes: ["number"], where: { cause: "summary", madeAt: { [Op.gte]: new Date(since) } }, order: ["number"], limit: LOOK_INTO,
  });
  if (near.length === 0) return null;
  const [row] = await connection().query<{ number: number; sha256: string; keyId: string }>(
    "SELECT number, LOWER(HEX(sha256)) AS sha256, key_id AS keyId FROM seals WHERE number IN (?) AND INSTR(leaves, ?) > 0 ORDER BY number LIMIT 1",
    { replacements: [near.map((seal) => seal.number), head], type: QueryTypes.SELECT },
  );
  return row ?? null;
}

function rowOf(row: Seal): SealRow {
  const facts = parseSeal(row.text.toString("utf8"));
  return {
    number: row.number, at: facts?.at ?? row.madeAt.toISOString(), cause: row.cause, chains: row.chains, root: facts?.root ?? "",
    prev: row.prev.toString("hex"), sha256: sha256(row.text).toString("hex"), keyId: row.keyId,
  };
}

function viewOf(row: Seal, keys: Map<string, string>): SealView {
  const key = keys.get(row.keyId) ?? null;
  return {
    ...rowOf(row), text: row.text.toString("utf8"), signature: row.signature.toString("base64"), key,
    signed: key !== null && verifySignature(key, row.text, row.signature),
  };
}

/** All seals, the newest first. A seal tells of no case: whoever may audit sees them all. */
export async function sealList(actor: Actor, { page, pageSize }: { page: number; pageSize: number }): Promise<ListView<SealRow>> {
  allow(actor, "audit.read");
  const { rows, count } = await Seal.findAndCountAll({ attributes: WITHOUT_LEAVES, order: [["number", "DESC"]], limit: pageSize, offset: (page - 1) * pageSize });
  return { items: rows.map(rowOf), total: count, page, pageSize };
}

/** `number` as it stands in an address. */
export async function sealByNumber(actor: Actor, number: string): Promise<SealView> {
  allow(actor, "audit.read");
  const row = /^[1-9]\d{0,9}$/.test(number) ? await Seal.findByPk(Number(number), { attributes: WITHOUT_LEAVES }) : null;
  if (!row) throw notFound("seal");
  return viewOf(row, await sealKeys());
}

/** The leaves as they were sealed, in the order of the tree. */
export function leavesOf(stored: Buffer): SealLeaf[] {
  return stored.toString("utf8").split("\n").filter(Boolean).map((line) => JSON.parse(line) as SealLeaf);
}

/** That this drive's log stood where a seal says: the way from its head to the root. The newest seal unless one is named. */
export async function driveProof(actor: Actor, driveId: string, number?: number): Promise<DriveProofView> {
  allow(actor, "custody.read");
  await driveFor(actor, driveId);
  const row = number === undefined ? await Seal.findOne({ order: [["number", "DESC"]] }) : await Seal.findByPk(number);
  if (!row) throw number === undefined ? new AppError("not-found", "There is no seal yet. Ask an auditor, a lead or the admin to make one.") : notFound("seal");
  const leaves = leavesOf(row.leaves);
  if (!leaves.some((leaf) => leaf.drive === driveId)) throw new AppError("not-found", `Seal ${row.number} says nothing of this drive: it was recorded later. Name a later seal, or have one made.`);
  return { seal: viewOf(row, await sealKeys()), proof: sealProof(row.number, leaves, [driveId], sha256) };
}
