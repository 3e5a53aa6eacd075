import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import type { PrintCaseView } from "@/lib/views";
import { Case, CaseReturn, Customer } from "@/models";
import { caseView } from "./cases";
import { people } from "./people";
import { currentPolicy } from "./policy";
import { receiptView } from "./receipts";
import { seenBy } from "./seen-by";

/** A case with what its papers say besides: the receipt, what went back, the workshop and its policy. */
export async function printCase(actor: Actor, caseId: string): Promise<PrintCaseView> {
  const view = await caseView(actor, caseId);
  const row = await CaseReturn.findOne({ where: { caseId } });
  const customer = await Customer.findByPk((await Case.findByPk(caseId))!.customerId);
  const who = await people();
  const { workshop, workshopAddress, timeZone } = env();
  return seenBy(actor, {
    case: view, receipt: await receiptView(actor, caseId), policy: await currentPolicy(), workshop, workshopAddress, timeZone, printedAt: new Date().toISOString(),
    company: customer?.company ?? null, returnAddress: customer?.returnAddress ?? null,
    returned: row ? { items: itemsOf(row.items), toPerson: row.toPerson, carrier: row.carrier ?? null, tracking: row.tracking ?? null, sealNumber: row.sealNumber ?? null, note: row.note ?? null, by: who(row.byUserId), at: row.at.toISOString() } : null,
  });
}

/** A list of texts, stored as JSON. */
function itemsOf(text: string): string[] {
  try {
    const list: unknown = JSON.parse(text);
    return Array.isArray(list) ? list.filter((one): one is string => typeof one === "string") : [];
  } catch {
    return [];
  }
}
