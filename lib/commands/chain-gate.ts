import { AppError } from "@/lib/errors";
import { checkCustody } from "@/lib/queries/custody";
import { CustodyEntry, type Transaction } from "@/models";

/** False while the drive's log has a fault that no auditor has assessed since. */
export async function chainIsClean(driveId: string, tx?: Transaction): Promise<boolean> {
  const { findings } = await checkCustody(driveId, tx);
  if (findings.length === 0) return true;
  const assessed = await CustodyEntry.max<number, CustodyEntry>("seq", { where: { chainId: driveId, action: "log.assessed" }, transaction: tx });
  return assessed !== null && findings.every((f) => f.seq === null || f.seq < assessed);
}

/** Approval, hand-out and transfer wait for an assessment when the log's check is not clean; appending goes on. */
export async function requireCleanChain(driveId: string, tx?: Transaction): Promise<void> {
  if (!(await chainIsClean(driveId, tx))) {
    throw new AppError("rule-against", "The custody log of this drive doesn't check out. Nothing is approved, handed out or transferred until an auditor has recorded an assessment; see the drive's log.");
  }
}
