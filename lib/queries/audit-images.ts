import { QueryTypes } from "sequelize";
import { casesOf } from "@/lib/commands/refuse";
import { type Actor, readName, type Stage } from "@/lib/core/words";
import type { AuditInput } from "@/lib/schemas/audit";
import { connection } from "@/models";
import { allowAudit } from "./audit-rights";

export interface ImageUse {
  name: string;
  chipId: string;
  designator: string;
  caseId: string;
  caseRef: string;
}

export interface StoredImageRow {
  sha256: string;
  sizeBytes: number;
  state: "sound" | "damaged" | "missing";
  storedAt: string;
  /** when its bytes were last read whole; null since it was stored */
  checkedAt: string | null;
  /** at most the first six */
  uses: ImageUse[];
  useCount: number;
}

const SORT: Record<string, string> = { checked: "COALESCE(i.checked_at, i.stored_at)", stored: "i.stored_at", size: "i.size_bytes", state: "i.state" };
const USES = 6;
const BEHIND = "FROM `reads` r JOIN chips ch ON ch.id = r.chip_id JOIN boards b ON b.id = ch.board_id JOIN drives d ON d.id = b.drive_id JOIN cases c ON c.id = d.case_id";

/** The stored images, the one unverified for longest first; for a limited auditor those that their cases use. */
export async function auditImages(actor: Actor, input: AuditInput): Promise<{ items: StoredImageRow[]; total: number; page: number; pageSize: number }> {
  allowAudit(actor);
  const cases = casesOf(actor);
  const mine = cases ? (cases.length > 0 ? "c.id IN (:cases)" : "FALSE") : "TRUE";
  const conditions = [cases ? `EXISTS (SELECT 1 ${BEHIND} WHERE r.sha256 = i.sha256 AND ${mine})` : "TRUE"];
  if (["sound", "damaged", "missing"].includes(input.what)) conditions.push("i.state = :what");
  if (input.what === "not-sound") conditions.push("i.state <> 'sound'");
  const digits = input.q.replace(/[^0-9a-f]/gi, "").toLowerCase().slice(0, 64);
  if (digits) conditions.push("HEX(i.sha256) LIKE :digits");
  else if (input.q.trim()) conditions.push("FALSE");
  const replacements = { cases, what: input.what, digits: `${digits}%`, limit: input.pageSize, offset: (input.page - 1) * input.pageSize };
  const [{ n }] = await connection().query<{ n: number }>(`SELECT COUNT(*) AS n FROM images i WHERE ${conditions.join(" AND ")}`, { replacements, type: QueryTypes.SELECT });
  const rows = await connection().query<{ sha256: Buffer; sizeBytes: number; state: StoredImageRow["state"]; storedAt: Date; checkedAt: Date | null }>(
    `SELECT i.sha256, i.size_bytes AS sizeBytes, i.state, i.stored_at AS storedAt, i.checked_at AS checkedAt FROM images i WHERE ${conditions.join(" AND ")}
     ORDER BY ${SORT[input.sort] ?? SORT.checked} ${input.order === "desc" ? "DESC" : "ASC"}, i.sha256 LIMIT :limit OFFSET :offset`,
    { replacements, type: QueryTypes.SELECT },
  );
  const uses = await usesOf(rows.map((row) => row.sha256), mine, cases);
  const items = rows.map((row): StoredImageRow => {
    const sha256 = row.sha256.toString("hex");
    const all = uses.get(sha256) ?? [];
    return { sha256, sizeBytes: row.sizeBytes, state: row.state, storedAt: row.storedAt.toISOString(), checkedAt: row.checkedAt?.toISOString() ?? null, uses: all.slice(0, USES), useCount: all.length };
  });
  return { items, total: Number(n), page: input.page, pageSize: input.pageSize };
}

async function usesOf(digests: Buffer[], mine: string, cases: readonly string[] | null): Promise<Map<string, ImageUse[]>> {
  const found = new Map<string, ImageUse[]>();
  if (digests.length === 0) return found;
  const rows = await connection().query<{ sha256: Buffer; stage: Stage; number: number; chipId: string; designator: string; caseId: string; caseRef: string }>(
    `SELECT r.sha256, r.stage, r.number, ch.id AS chipId, ch.designator, c.id AS caseId, c.ref AS caseRef ${BEHIND}
     WHERE r.sha256 IN (:digests) AND ${mine} ORDER BY c.ref, ch.designator, r.stage, r.number`,
    { replacements: { digests, cases }, type: QueryTypes.SELECT },
  );
  for (const { sha256, stage, number, ...place } of rows) {
    const key = sha256.toString("hex");
    found.set(key, [...(found.get(key) ?? []), { name: readName(stage, number), ...place }]);
  }
  return found;
}
