import { randomUUID } from "node:crypto";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import type { CaseInput } from "@/lib/schemas/case";
import { Case, Customer, inTransaction } from "@/models";
import { appendEntry } from "./append-entry";
import { nextCaseRef } from "./next-case-ref";
import { allow } from "./refuse";

/** Records a case with its customer; its number counts up per year in the workshop's time zone. */
export async function createCase(actor: Actor, input: CaseInput): Promise<{ id: string; ref: string }> {
  allow(actor, "case.create");
  return inTransaction(async (tx) => {
    const now = new Date();
    const ref = await nextCaseRef(tx, now);
    const customer = await Customer.create({
      id: randomUUID(), name: input.customer.name, email: input.customer.email,
      phone: input.customer.phone ?? null, contact: input.customer.contact ?? null, createdAt: now,
    }, { transaction: tx });
    const made = await Case.create({
      id: randomUUID(), ref, customerId: customer.id, damage: input.damage, note: input.note ?? null,
      dueOn: input.dueOn ?? null, receivedAt: now, createdBy: actor.id,
    }, { transaction: tx });
    await appendEntry(tx, WORKSHOP_CHAIN, actor, "case.received", { type: "case", id: made.id }, {
      ref, damage: made.damage, dueOn: made.dueOn, receivedAt: now.toISOString(),
    });
    return { id: made.id, ref };
  });
}
