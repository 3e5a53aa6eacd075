import { QueryTypes } from "sequelize";
import { caseFor } from "@/lib/commands/place";
import { allow, casesOf } from "@/lib/commands/refuse";
import { erasureRefusal, isDue } from "@/lib/core/erasure";
import { unverifiedChips } from "@/lib/core/closing";
import { may } from "@/lib/core/policy";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import type { ErasureItemView, ErasureView } from "@/lib/views";
import { connection, Erasure, Request } from "@/models";
import { closingFacts } from "./closing";
import { erasureFacts, type ErasureItem, erasureItems } from "./erasure-items";
import { people } from "./people";
import { seenBy } from "./seen-by";
import { dayIn } from "./workshop-day";

const plain = ({ sha256, sizeBytes, names }: ErasureItem): ErasureItemView => ({ sha256, sizeBytes, names });
const listOf = (json: string) => JSON.parse(json) as ErasureItemView[];

/** What is stored of a case and what became of it; null while the case is open and was never erased. */
export async function erasureView(actor: Actor, caseId: string): Promise<ErasureView | null> {
  allow(actor, "case.read");
  const found = await caseFor(actor, caseId);
  const rows = await Erasure.findAll({ where: { caseId }, order: [["at", "DESC"]] });
  if (!found.closedAt && rows.length === 0) return null;
  const { goes, stays } = await erasureItems(caseId);
  const facts = await erasureFacts(found, { images: goes.length, kept: stays.length });
  const request = await Request.findOne({ where: { caseId }, attributes: ["id", "deletionAskedAt", "deletionAnsweredAt"] });
  const who = await people();
  // where else the same bytes are is for those who erase: they may see every case
  const erases = may(actor, "case.erase");
  return seenBy(actor, {
    caseId, caseRef: found.ref, eraseOn: found.eraseOn ?? null, kept: found.keptUntil ? { until: found.keptUntil, reason: found.keptReason ?? "" } : null, due: isDue(facts),
    refusal: erasureRefusal(facts), goes: [...goes].sort((a, b) => Number(a.photo) - Number(b.photo) || (a.names[0] ?? "").localeCompare(b.names[0] ?? "", "en", { numeric: true })).map(plain),
    bytes: goes.reduce((sum, item) => sum + item.sizeBytes, 0), photos: goes.filter((item) => item.photo).length,
    stays: stays.map((item) => ({ ...plain(item), also: erases ? [...new Set(item.uses.filter((use) => use.shelf || use.caseId !== caseId).map((use) => use.name))] : [] })),
    unverified: unverifiedChips(await closingFacts(found)),
    wish: request?.deletionAskedAt ? { requestId: request.id, askedAt: request.deletionAskedAt.toISOString(), answeredAt: request.deletionAnsweredAt?.toISOString() ?? null } : null,
    erasures: rows.map((row) => ({
      id: row.id, at: row.at.toISOString(), by: who(row.byUserId), cause: row.cause, reason: row.reason, images: row.images, photos: row.photos, bytes: Number(row.bytes), erased: listOf(row.erased), kept: listOf(row.kept),
    })),
  });
}

/** Closed cases whose day has come and of which something is stored, the one due for longest first. */
export async function casesDue(actor: Actor): Promise<string[]> {
  allow(actor, "case.read");
  const cases = casesOf(actor);
  const rows = await connection().query<{ id: string }>(
    `SELECT k.id FROM cases k WHERE k.closed_at IS NOT NULL AND k.erased_at IS NULL AND k.erase_on <= :today AND (k.kept_until IS NULL OR k.kept_until <= :today)
       AND ${cases === null ? "TRUE" : "k.id IN (:cases)"}
       AND (EXISTS (SELECT 1 FROM photos p JOIN images i ON i.sha256 = p.sha256 WHERE p.case_id = k.id AND i.state <> 'erased')
         OR EXISTS (SELECT 1 FROM drives d JOIN boards b ON b.drive_id = d.id JOIN chips c ON c.board_id = b.id JOIN \`reads\` r ON r.chip_id = c.id
           JOIN images i ON i.sha256 = r.sha256 WHERE d.case_id = k.id AND i.state <> 'erased'))
     ORDER BY k.erase_on, k.ref`,
    { replacements: { today: dayIn(env().timeZone, new Date()), cases: cases && cases.length > 0 ? cases : [""] }, type: QueryTypes.SELECT },
  );
  return rows.map((row) => row.id);
}

/** For the bench of those who decide: how many cases are due, and which customers wait for an answer. */
export async function erasuresWaiting(actor: Actor): Promise<{ due: number; wishes: { caseId: string; caseRef: string; askedAt: string }[] } | null> {
  if (!may(actor, "case.erase")) return null;
  const wishes = await connection().query<{ caseId: string; caseRef: string; askedAt: Date }>(
    `SELECT k.id AS caseId, k.ref AS caseRef, r.deletion_asked_at AS askedAt FROM requests r JOIN cases k ON k.id = r.case_id
     WHERE r.deletion_asked_at IS NOT NULL AND r.deletion_answered_at IS NULL ORDER BY r.deletion_asked_at`, { type: QueryTypes.SELECT },
  );
  return { due: (await casesDue(actor)).length, wishes: wishes.map((one) => ({ ...one, askedAt: one.askedAt.toISOString() })) };
}
