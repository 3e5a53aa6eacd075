import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { CaseCorrection } from "@/lib/schemas/note";
import { Customer, inTransaction } from "@/models";
import { appendToCase, lockCase } from "./append-to-case";
import { type Change, changesOf } from "./correct-facts";
import { caseFor } from "./place";
import { allow } from "./refuse";
import { requireOpen } from "./require-open";

/** Stands in the log for what is the customer's own: no name and no address goes in there. */
const NOT_LOGGED = "(not in the log)";

/** Corrects what was typed about a case and its customer. */
export async function correctCase(actor: Actor, caseId: string, { changes: wanted, reason }: CaseCorrection): Promise<{ id: string }> {
  allow(actor, "fact.correct");
  await caseFor(actor, caseId);
  const { damage, note, dueOn, customerName, customerEmail, customerPhone, customerCompany, returnAddress } = wanted;
  return inTransaction(async (tx) => {
    const { found, chains } = await lockCase(tx, caseId);
    requireOpen(found);
    const customer = (await Customer.findByPk(found.customerId, { transaction: tx, lock: tx.LOCK.UPDATE }))!;
    const own = { name: customerName, email: customerEmail, phone: customerPhone, company: customerCompany, returnAddress };
    const ofCase = changesOf(found, { damage, note, dueOn });
    const ofCustomer = changesOf(customer, own);
    if (ofCase.length + ofCustomer.length === 0) throw new AppError("does-not-fit", "Nothing would change: these are the values on record.");
    await found.update(valuesOf(ofCase), { transaction: tx });
    await customer.update(valuesOf(ofCustomer), { transaction: tx });
    const masked = ofCustomer.map(({ field }): Change => ({ field: `customer's ${field === "returnAddress" ? "address" : field}`, from: NOT_LOGGED, to: NOT_LOGGED }));
    await appendToCase(tx, chains, actor, "case.corrected", { type: "case", id: caseId }, { caseRef: found.ref, changes: [...ofCase, ...masked], reason });
    return { id: caseId };
  });
}

const valuesOf = (changes: Change[]) => Object.fromEntries(changes.map(({ field, to }) => [field, to]));
