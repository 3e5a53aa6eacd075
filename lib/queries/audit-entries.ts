import { createHash } from "node:crypto";
import { QueryTypes } from "sequelize";
import { casesOf, notFound } from "@/lib/commands/refuse";
import { dayStart, ENTRY_LISTS, type EntryList, readEntry, WORKSHOP_LISTS } from "@/lib/core/audit";
import type { AuditEntryRow, ChainPlace } from "@/lib/core/audit-rows";
import { signedBytes } from "@/lib/core/custody";
import { readCaseRef } from "@/lib/core/case-number";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { env } from "@/lib/env";
import type { AuditInput } from "@/lib/schemas/audit";
import { connection } from "@/models";
import { verifySignature } from "@/storage";
import { allowAudit } from "./audit-rights";
import { logKeys } from "./custody";
import { seenBy } from "./seen-by";

export interface EntryPage {
  items: AuditEntryRow[];
  total: number;
  page: number;
  pageSize: number;
}

const BODY = "CONVERT(e.body USING utf8mb4)";
const at = `JSON_VALUE(${BODY}, '$.at')`;
const who = `JSON_VALUE(${BODY}, '$.actor.name')`;
const FROM = "FROM custody_entries e LEFT JOIN drives d ON d.id = e.chain_id LEFT JOIN cases c ON c.id = d.case_id";
const SORT: Record<string, string> = { time: at, who, action: "e.action", case: "c.ref" };
// No action marks a clock that went back: looked for as text first, since reading every body as JSON takes its time.
const CLOCK = `(LOCATE('"clockBehindMs":', e.body) > 0 OR LOCATE('"headBehind":', e.body) > 0)
  AND (JSON_VALUE(${BODY}, '$.facts.clockBehindMs') IS NOT NULL OR JSON_VALUE(${BODY}, '$.facts.headBehind') IS NOT NULL)`;

type Replacements = Record<string, unknown>;

function scope(actor: Actor, list: EntryList): { where: string[]; replacements: Replacements } {
  allowAudit(actor);
  if (actor.cases && WORKSHOP_LISTS.includes(list)) throw notFound("list");
  const actions: readonly string[] = ENTRY_LISTS[list];
  const where = [actions.length > 0 ? "e.action IN (:actions)" : CLOCK];
  const cases = casesOf(actor);
  if (cases) where.push(cases.length > 0 ? "d.case_id IN (:cases)" : "FALSE");
  return { where, replacements: { actions, cases } };
}

const like = (word: string) => `%${word.replace(/[\\%_]/g, (c) => `\\${c}`)}%`;

function matching(input: AuditInput, replacements: Replacements): string[] {
  const where: string[] = [];
  const reading = readCaseRef(input.q.trim());
  if (reading.kind === "ref") {
    where.push("c.ref = :ref");
    replacements.ref = reading.ref;
  } else for (const [i, word] of input.q.split(/\s+/).filter(Boolean).entries()) {
    where.push(`(${BODY} LIKE :word${i} OR c.ref LIKE :word${i})`);
    replacements[`word${i}`] = like(word);
  }
  if (input.what) where.push("e.action = :what");
  if (input.who) where.push(`${who} = :who`);
  if (input.from) where.push(`${at} >= :from`);
  if (input.to) where.push(`${at} < :to`);
  const zone = env().timeZone;
  Object.assign(replacements, { what: input.what, who: input.who, from: input.from && dayStart(input.from, zone), to: input.to && dayStart(input.to, zone, 1) });
  return where;
}

interface Row {
  chain: string;
  seq: number;
  action: string;
  body: Buffer;
  hash: Buffer;
  signature: Buffer;
  keyId: string;
  driveId: string | null;
  position: number | null;
  caseId: string | null;
  ref: string | null;
}

/** Entries of the logs by what they say: filtered, sorted and paged by the database, their bodies read as hostile input. */
export async function auditEntries(actor: Actor, list: EntryList, input: AuditInput): Promise<EntryPage> {
  const { where, replacements } = scope(actor, list);
  const condition = [...where, ...matching(input, replacements)].join(" AND ");
  const [{ n }] = await connection().query<{ n: number }>(`SELECT COUNT(*) AS n ${FROM} WHERE ${condition}`, { replacements, type: QueryTypes.SELECT });
  const direction = input.order === "asc" ? "ASC" : "DESC";
  const rows = await connection().query<Row>(
    `SELECT e.chain_id AS chain, e.seq, e.action, e.body, e.hash, e.signature, e.key_id AS keyId, d.id AS driveId, d.position, c.id AS caseId, c.ref ${FROM} WHERE ${condition}
     ORDER BY ${SORT[input.sort] ?? at} ${direction}, ${at} ${direction}, e.chain_id, e.seq ${direction} LIMIT :limit OFFSET :offset`,
    { replacements: { ...replacements, limit: input.pageSize, offset: (input.page - 1) * input.pageSize }, type: QueryTypes.SELECT },
  );
  const keys = await logKeys();
  return { items: await seenBy(actor, rows.map((row) => entryRow(row, keys))), total: Number(n), page: input.page, pageSize: input.pageSize };
}

function entryRow(row: Row, keys: ReadonlyMap<string, string>): AuditEntryRow {
  const reading = readEntry(row.body.toString("utf8"), row.action);
  return { ...reading, trouble: reading.trouble ?? forged(row, keys), ...placeOfChain(row), seq: row.seq, hash: row.hash.toString("hex") };
}

/** A row stands here by itself, without its neighbours: its own hash and signature are what can be held against it. */
function forged({ body, hash, signature, keyId }: Row, keys: ReadonlyMap<string, string>): string | null {
  if (!createHash("sha256").update(body).digest().equals(hash)) return "Its text was changed: it doesn't give the hash beside it.";
  const pem = keys.get(keyId);
  if (pem === undefined) return "It is signed with a key that the workshop never introduced.";
  return verifySignature(pem, signedBytes(body), signature) ? null : "Its signature doesn't fit its text.";
}

export function placeOfChain(row: { chain: string; driveId: string | null; position: number | null; caseId: string | null; ref: string | null }): ChainPlace {
  const letter = row.position === null ? "" : String.fromCharCode(64 + ((row.position - 1) % 26) + 1);
  return { chainId: row.chain, workshop: row.chain === WORKSHOP_CHAIN, driveId: row.driveId, letter, caseId: row.caseId, caseRef: row.ref ?? "" };
}

/** Who stands in a list, for its choice of persons: at most 200 names. */
export async function auditPersons(actor: Actor, list: EntryList): Promise<string[]> {
  const { where, replacements } = scope(actor, list);
  const rows = await connection().query<{ name: string | null }>(`SELECT DISTINCT ${who} AS name ${FROM} WHERE ${where.join(" AND ")} ORDER BY name LIMIT 200`, { replacements, type: QueryTypes.SELECT });
  return rows.flatMap((row) => (row.name ? [row.name] : []));
}
