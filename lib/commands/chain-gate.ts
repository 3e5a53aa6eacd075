import type { ChainProblem } from "@/lib/core/custody";
import { AppError } from "@/lib/errors";
import { checkCustody } from "@/lib/queries/custody";
import { CustodyEntry, type Transaction } from "@/models";

/** What shows at an entry and says something about what lies before it. */
const ABOUT_THE_PAST = new Set<string>(["prev", "sequence", "time-went-back"] satisfies ChainProblem[]);

/**
 * False while the drive's log has a fault that no auditor has assessed since. An assessment covers the entries before
 * it, never itself: one that somebody forged opens nothing. A fault of the head lies after every assessment.
 */
export async function chainIsClean(driveId: string, tx?: Transaction): Promise<boolean> {
  const { findings } = await checkCustody(driveId, tx);
  if (findings.length === 0) return true;
  const assessed = await lastAssessment(driveId, tx);
  return findings.every((finding) => covers(assessed, finding));
}

/** Whether an assessment at this place says something about a finding of the check. */
export function covers(assessed: number, { seq, problem }: { seq: number | null; problem: string }): boolean {
  return seq !== null && (seq < assessed || (seq === assessed && ABOUT_THE_PAST.has(problem)));
}

/** Its place in the chain, 0 without one. The signed body counts, not the column beside it. */
async function lastAssessment(driveId: string, tx?: Transaction): Promise<number> {
  const rows = await CustodyEntry.findAll({ where: { chainId: driveId, action: "log.assessed" }, order: [["seq", "DESC"]], transaction: tx });
  return rows.find(saysAssessed)?.seq ?? 0;
}

function saysAssessed({ body }: CustodyEntry): boolean {
  try {
    return (JSON.parse(body.toString("utf8")) as { action?: unknown }).action === "log.assessed";
  } catch {
    return false;
  }
}

/** Approval, hand-out and transfer wait for an assessment when the log's check is not clean; appending goes on. */
export async function requireCleanChain(driveId: string, tx?: Transaction): Promise<void> {
  if (!(await chainIsClean(driveId, tx))) {
    throw new AppError("rule-against", "The custody log of this drive doesn't check out. Nothing is approved, handed out or transferred until an auditor has recorded an assessment; see the drive's log.");
  }
}
