import { Op } from "sequelize";
import { covers } from "@/lib/commands/chain-gate";
import { casesOf } from "@/lib/commands/refuse";
import type { AssessmentRow, LogFinding, WaitingDrive } from "@/lib/core/audit-rows";
import type { Actor } from "@/lib/core/words";
import type { AuditInput } from "@/lib/schemas/audit";
import { Case, ChainCheck, CustodyEntry, Drive } from "@/models";
import { auditEntries, type EntryPage, placeOfChain } from "./audit-entries";
import { allowAudit } from "./audit-rights";
import { checkCustody } from "./custody";

const MOST_WAITING = 50;
const MOST_FINDINGS = 20;

/** The assessments with what each of them covered. The log of every drive on the page is checked for it. */
export async function auditAssessments(actor: Actor, input: AuditInput): Promise<EntryPage & { items: AssessmentRow[] }> {
  const list = await auditEntries(actor, "assessments", input);
  const chains = [...new Set(list.items.map((row) => row.chainId))];
  const entries = await CustodyEntry.findAll({ attributes: ["chainId", "seq"], where: { chainId: chains, action: "log.assessed" }, order: ["seq"] });
  const findings = new Map<string, LogFinding[]>();
  for (const chain of chains) findings.set(chain, (await checkCustody(chain)).findings);
  const items = list.items.map((row): AssessmentRow => {
    const earlier = entries.filter((entry) => entry.chainId === row.chainId && entry.seq < row.seq);
    return { ...row, covered: findings.get(row.chainId)!.filter((f) => covers(row.seq, f) && !earlier.some((entry) => covers(entry.seq, f))) };
  });
  return { ...list, items };
}

/** Drives whose last check found something that nobody has assessed since: work on them is closed. They are checked again here. */
export async function drivesWaiting(actor: Actor): Promise<WaitingDrive[]> {
  allowAudit(actor);
  const cases = casesOf(actor);
  const checks = await ChainCheck.findAll({ where: { findings: { [Op.gt]: 0 } }, order: [["checkedAt", "DESC"]] });
  const drives = await Drive.findAll({ where: { id: checks.map((c) => c.chainId), ...(cases ? { caseId: [...cases] } : {}) }, include: [{ model: Case, as: "case" }], limit: MOST_WAITING });
  const waiting: WaitingDrive[] = [];
  for (const drive of drives) {
    const { findings } = await checkCustody(drive.id);
    const last = await CustodyEntry.findOne({ attributes: ["seq"], where: { chainId: drive.id, action: "log.assessed" }, order: [["seq", "DESC"]] });
    const open = findings.filter((f) => !covers(last?.seq ?? 0, f));
    if (open.length === 0) continue;
    const place = placeOfChain({ chain: drive.id, driveId: drive.id, position: drive.position, caseId: drive.caseId, ref: (drive as unknown as { case: Case }).case.ref });
    waiting.push({ ...place, checkedAt: checks.find((c) => c.chainId === drive.id)!.checkedAt.toISOString(), findings: open.slice(0, MOST_FINDINGS), count: open.length });
  }
  return waiting;
}
