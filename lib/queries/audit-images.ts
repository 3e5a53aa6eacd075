import { QueryTypes } from "sequelize";
import { casesOf } from "@/lib/commands/refuse";
import type { ImageCounts, StoredImageRow } from "@/lib/core/audit-rows";
import type { Actor } from "@/lib/core/words";
import type { AuditInput } from "@/lib/schemas/audit";
import { connection } from "@/models";
import { allowAudit } from "./audit-rights";
import { imagesOfDrives, usesOfImages } from "./image-uses";
import { scrubState } from "./scrub-state";

/** the last time all of its bytes were seen to be right: a check, or the upload itself */
const VERIFIED = "COALESCE(i.checked_at, i.stored_at)";
const SORT: Record<string, string> = { checked: VERIFIED, stored: "i.stored_at", size: "i.size_bytes", state: "i.state" };
const STATES = ["sound", "damaged", "missing", "erased"];
const USES = 12;

function scope(actor: Actor): { where: string; cases: readonly string[] | null } {
  allowAudit(actor);
  const cases = casesOf(actor);
  if (!cases) return { where: "TRUE", cases };
  return { where: cases.length > 0 ? `i.sha256 IN (SELECT u.sha256 FROM (${imagesOfDrives("d.case_id IN (:cases)")}) u WHERE u.sha256 IS NOT NULL)` : "FALSE", cases };
}

/** The stored images, the one unverified for longest first; for a limited auditor those that their cases use. */
export async function auditImages(actor: Actor, input: AuditInput): Promise<{ items: StoredImageRow[]; total: number; page: number; pageSize: number }> {
  const { where, cases } = scope(actor);
  const conditions = [where];
  if (STATES.includes(input.what)) conditions.push("i.state = :what");
  if (input.what === "not-sound") conditions.push("i.state IN ('damaged', 'missing')");
  const digits = /^[0-9a-f\s…]+$/i.test(input.q) ? input.q.replace(/[^0-9a-f]/gi, "").slice(0, 64) : "";
  if (digits) conditions.push("HEX(i.sha256) LIKE :digits");
  else if (input.q.trim()) conditions.push("FALSE");
  const replacements = { cases, what: input.what, digits: `${digits}%`, limit: input.pageSize, offset: (input.page - 1) * input.pageSize };
  const condition = conditions.join(" AND ");
  const [{ n }] = await connection().query<{ n: number }>(`SELECT COUNT(*) AS n FROM images i WHERE ${condition}`, { replacements, type: QueryTypes.SELECT });
  const rows = await connection().query<{ sha256: Buffer; sizeBytes: number; state: StoredImageRow["state"]; storedAt: Date; checkedAt: Date | null; erasedAt: Date | null }>(
    `SELECT i.sha256, i.size_bytes AS sizeBytes, i.state, i.stored_at AS storedAt, i.checked_at AS checkedAt, i.erased_at AS erasedAt FROM images i WHERE ${condition}
     ORDER BY ${SORT[input.sort] ?? VERIFIED} ${input.order === "desc" ? "DESC" : "ASC"}, i.sha256 LIMIT :limit OFFSET :offset`,
    { replacements, type: QueryTypes.SELECT },
  );
  const uses = (await usesOfImages(rows.map((row) => row.sha256))).filter((use) => !cases || (use.caseId !== null && cases.includes(use.caseId)));
  const items = rows.map((row): StoredImageRow => {
    const sha256 = row.sha256.toString("hex");
    const mine = uses.filter((use) => use.sha256 === sha256);
    return {
      sha256, sizeBytes: row.sizeBytes, state: row.state, storedAt: row.storedAt.toISOString(), checkedAt: row.checkedAt?.toISOString() ?? null, erasedAt: row.erasedAt?.toISOString() ?? null,
      uses: mine.slice(0, USES).map(({ name, chipId, driveId, caseId }) => ({ name, chipId, driveId, caseId })), useCount: mine.length,
    };
  });
  return { items, total: Number(n), page: input.page, pageSize: input.pageSize };
}

/** How many there are, how many are not whole, since when the one unverified for longest is, and how the reading again goes. */
export async function imageCounts(actor: Actor): Promise<ImageCounts> {
  const { images, states, oldestAt, neverChecked, state, sentence, days, mebibytesPerSecond, hours } = await scrubState(actor);
  return { total: images, damaged: states.damaged, missing: states.missing, oldest: oldestAt, neverChecked, keeping: state, keepingSentence: sentence, days, mebibytesPerSecond, hours };
}
