import { randomUUID } from "node:crypto";
import { QueryTypes } from "sequelize";
import { caseRef } from "@/lib/core/case-number";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { env } from "@/lib/env";
import type { CaseInput } from "@/lib/schemas/case";
import { Case, connection, Customer, inTransaction, type Transaction } from "@/models";
import { appendEntry } from "./append-entry";
import { allow } from "./refuse";

/** Records a case with its customer; its number counts up per year in the workshop's time zone. */
export async function createCase(actor: Actor, input: CaseInput): Promise<{ id: string; ref: string }> {
  allow(actor, "case.create");
  return inTransaction(async (tx) => {
    const now = new Date();
    const ref = await nextRef(tx, now);
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

async function nextRef(tx: Transaction, now: Date): Promise<string> {
  const year = Number(new Intl.DateTimeFormat("en", { timeZone: env().timeZone, year: "numeric" }).format(now));
  await connection().query(
    "INSERT INTO case_counters (year, last_number) VALUES (?, 1) ON DUPLICATE KEY UPDATE last_number = last_number + 1",
    { replacements: [year], transaction: tx },
  );
  const [row] = await connection().query<{ n: number }>("SELECT last_number AS n FROM case_counters WHERE year = ?", {
    replacements: [year], transaction: tx, type: QueryTypes.SELECT,
  });
  return caseRef(year, row.n);
}
