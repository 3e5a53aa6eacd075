import { covers } from "@/lib/commands/chain-gate";
import type { AssessmentRow, LogFinding, WaitingLog } from "@/lib/core/audit-rows";
import type { Actor } from "@/lib/core/words";
import type { AuditInput } from "@/lib/schemas/audit";
import { CustodyEntry } from "@/models";
import { chainsAgainst } from "./audit-drives";
import { auditEntries, type EntryPage } from "./audit-entries";
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

/** Logs whose last check found something that nobody has assessed since; work on such a drive is closed. They are checked again here. */
export async function logsWaiting(actor: Actor): Promise<WaitingLog[]> {
  const waiting: WaitingLog[] = [];
  for (const { check, ...place } of await chainsAgainst(actor, MOST_WAITING)) {
    const { findings } = await checkCustody(place.chainId);
    const last = await CustodyEntry.findOne({ attributes: ["seq"], where: { chainId: place.chainId, action: "log.assessed" }, order: [["seq", "DESC"]] });
    const open = findings.filter((f) => !covers(last?.seq ?? 0, f));
    if (open.length > 0) waiting.push({ ...place, checkedAt: check.at, findings: open.slice(0, MOST_FINDINGS), count: open.length });
  }
  return waiting;
}
