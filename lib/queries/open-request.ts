import { shareHash } from "./open-share";
import { Case, Request, type Transaction } from "@/models";
import { currentPolicy } from "./policy";

const DAY_MS = 86_400_000;

/** When the customer's link ends: when a lead withdrew it, or some days after the case was closed; null while neither is known. */
export function linkEnds(request: Pick<Request, "expiresAt">, found: Pick<Case, "closedAt">, shareDays: number): Date | null {
  const closed = found.closedAt ? found.closedAt.getTime() + shareDays * DAY_MS : Infinity;
  const ends = Math.min(request.expiresAt.getTime(), closed);
  return ends >= Date.parse("9999-01-01T00:00:00Z") ? null : new Date(ends);
}

/** The request behind a private link, or null when it is unknown, past its end or withdrawn: all look the same. */
export async function openRequest(token: string, tx?: Transaction): Promise<{ request: Request; case: Case; ends: Date | null } | null> {
  if (!/^[A-Za-z0-9_-]{43}$/.test(token)) return null;
  const request = await Request.findOne({ where: { tokenHash: shareHash(token) }, transaction: tx });
  const found = request && (await Case.findOne({ where: { id: request.caseId }, transaction: tx }));
  if (!request || !found) return null;
  const ends = linkEnds(request, found, (await currentPolicy(tx)).shareDays);
  return ends && ends.getTime() <= Date.now() ? null : { request, case: found, ends };
}
