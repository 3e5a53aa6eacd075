import { QueryTypes } from "sequelize";
import { casesOf } from "@/lib/commands/refuse";
import type { ChainCounts, ChainPlace, ChainRow } from "@/lib/core/audit-rows";
import { readCaseRef } from "@/lib/core/case-number";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import type { AuditInput } from "@/lib/schemas/audit";
import { connection } from "@/models";
import { placeOfChain } from "./audit-entries";
import { allowAudit } from "./audit-rights";

// Every chain that there is any sign of: a drive without a head, and a head whose drive is gone, are what an auditor looks for.
const CHAINS = `(SELECT id AS chain FROM drives UNION SELECT chain_id FROM custody_heads UNION SELECT DISTINCT chain_id FROM custody_entries UNION SELECT '${WORKSHOP_CHAIN}') x
  LEFT JOIN drives d ON d.id = x.chain LEFT JOIN cases c ON c.id = d.case_id
  LEFT JOIN custody_heads h ON h.chain_id = x.chain LEFT JOIN chain_checks k ON k.chain_id = x.chain`;
const SORT: Record<string, string> = { case: "c.ref", entries: "h.seq", checked: "k.checked_at", findings: "k.findings", latest: "h.at" };
const STATE: Record<string, string> = { clean: "k.findings = 0", findings: "k.findings > 0", unchecked: "k.chain_id IS NULL" };

function scope(actor: Actor): { where: string; cases: readonly string[] | null } {
  allowAudit(actor);
  const cases = casesOf(actor);
  return { where: cases ? (cases.length > 0 ? "d.case_id IN (:cases)" : "FALSE") : "TRUE", cases };
}

const PLACE = "x.chain, d.id AS driveId, d.position, c.id AS caseId, c.ref";

type PlaceRow = Parameters<typeof placeOfChain>[0];

interface Row extends PlaceRow {
  label: string | null;
  seq: number | null;
  hash: Buffer | null;
  at: string | null;
  checkedAt: Date | null;
  entries: number | null;
  findings: number | null;
  first: string | null;
}

/** Every log with its head and its last check; filtered, sorted and paged by the database. */
export async function auditDrives(actor: Actor, input: AuditInput): Promise<{ items: ChainRow[]; total: number; page: number; pageSize: number }> {
  const { where, cases } = scope(actor);
  const conditions = [where];
  const q = input.q.trim();
  const reading = readCaseRef(q);
  if (reading.kind === "ref") conditions.push("c.ref = :ref");
  else if (q) conditions.push("(c.ref LIKE :q OR d.part_number LIKE :q OR d.model LIKE :q OR d.serial LIKE :q)");
  if (STATE[input.what]) conditions.push(STATE[input.what]);
  const replacements = { cases, ref: reading.kind === "ref" ? reading.ref : "", q: `%${q.replace(/[\\%_]/g, (c) => `\\${c}`)}%`, limit: input.pageSize, offset: (input.page - 1) * input.pageSize };
  const condition = conditions.join(" AND ");
  const [{ n }] = await connection().query<{ n: number }>(`SELECT COUNT(*) AS n FROM ${CHAINS} WHERE ${condition}`, { replacements, type: QueryTypes.SELECT });
  const direction = input.order === "asc" ? "ASC" : "DESC";
  const rows = await connection().query<Row>(
    `SELECT ${PLACE}, COALESCE(d.part_number, d.model, d.serial) AS label, h.seq, h.hash, h.at,
       k.checked_at AS checkedAt, k.entries, k.findings, k.first_finding AS first
     FROM ${CHAINS} WHERE ${condition} ORDER BY ${SORT[input.sort] ?? "c.ref"} ${direction}, c.ref DESC, d.position, x.chain LIMIT :limit OFFSET :offset`,
    { replacements, type: QueryTypes.SELECT },
  );
  return { items: rows.map(chainRow), total: Number(n), page: input.page, pageSize: input.pageSize };
}

function chainRow(row: Row): ChainRow {
  return {
    ...placeOfChain(row), label: row.label ?? "", entries: row.seq ?? 0, hash: row.hash?.toString("hex") ?? "", lastAt: row.seq ? row.at ?? "" : "",
    check: row.checkedAt && { at: row.checkedAt.toISOString(), entries: row.entries ?? 0, findings: row.findings ?? 0, first: row.first },
  };
}

/** How many logs checked out at their last check; a limited auditor's are those of their cases. */
export async function chainCounts(actor: Actor): Promise<ChainCounts> {
  const { where, cases } = scope(actor);
  const [row] = await connection().query<{ total: number; clean: number; findings: number; unchecked: number; oldest: Date | null }>(
    `SELECT COUNT(*) AS total, COALESCE(SUM(k.findings = 0), 0) AS clean, COALESCE(SUM(k.findings > 0), 0) AS findings, COALESCE(SUM(k.chain_id IS NULL), 0) AS unchecked,
       MIN(k.checked_at) AS oldest FROM ${CHAINS} WHERE ${where}`,
    { replacements: { cases }, type: QueryTypes.SELECT },
  );
  const unchecked = Number(row.unchecked);
  return { total: Number(row.total), clean: Number(row.clean), findings: Number(row.findings), unchecked, oldestCheck: unchecked === 0 ? row.oldest?.toISOString() ?? null : null };
}

/** The logs that something was found against at their last check, the latest check first. */
export async function chainsAgainst(actor: Actor, limit: number): Promise<(ChainPlace & { check: { at: string } })[]> {
  const { where, cases } = scope(actor);
  const rows = await connection().query<PlaceRow & { checkedAt: Date }>(
    `SELECT ${PLACE}, k.checked_at AS checkedAt FROM ${CHAINS} WHERE ${where} AND ${STATE.findings} ORDER BY k.checked_at DESC, x.chain LIMIT :limit`,
    { replacements: { cases, limit }, type: QueryTypes.SELECT },
  );
  return rows.map((row) => ({ ...placeOfChain(row), check: { at: row.checkedAt.toISOString() } }));
}
