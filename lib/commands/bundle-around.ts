import { itemsOf } from "@/lib/queries/closing";
import type { People } from "@/lib/queries/people";
import { startUpFacts } from "@/lib/queries/start-up";
import type { ReportReceipt, ReportReturn, ReportStartUp } from "@/lib/report/report-facts";
import { CaseReturn, Receipt, StartUpTest, type Transaction } from "@/models";

export interface BundleAround {
  receipt: ReportReceipt | null;
  returned: ReportReturn | null;
  startUpTests(driveId: string): ReportStartUp[];
}

/** How the parcel came, what the tests of the drives showed, and what went back. No key is named "id", "path" or "sha256": see bundle-photos. */
export async function bundleAround(tx: Transaction, caseId: string, driveIds: readonly string[], who: People): Promise<BundleAround> {
  const at = { transaction: tx };
  const receipt = await Receipt.findOne({ where: { caseId }, ...at });
  const sent = await CaseReturn.findOne({ where: { caseId }, ...at });
  const tests = await StartUpTest.findAll({ where: { driveId: [...driveIds] }, order: ["at", "id"], ...at });
  return {
    receipt: receipt && {
      at: receipt.at.toISOString(), by: who(receipt.byUserId).name, condition: receipt.parcelCondition, carrier: receipt.carrier ?? null, tracking: receipt.tracking ?? null, sealAsSent: receipt.sealAsSent,
      sealNumber: receipt.sealNumber ?? null, smallBoard: receipt.smallBoard, accessories: receipt.accessories ?? null, differs: receipt.differs ?? null,
    },
    returned: sent && {
      at: sent.at.toISOString(), by: who(sent.byUserId).name, to: sent.toPerson, items: itemsOf(sent), carrier: sent.carrier ?? null, tracking: sent.tracking ?? null, sealNumber: sent.sealNumber ?? null, note: sent.note ?? null,
    },
    startUpTests: (driveId) => tests.filter((row) => row.driveId === driveId).map((row) => ({ at: row.at.toISOString(), by: who(row.byUserId).name, ...startUpFacts(row), note: row.note ?? null })),
  };
}
