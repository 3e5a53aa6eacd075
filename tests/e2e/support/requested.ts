import { randomBytes, randomUUID } from "node:crypto";
import { asAdmin } from "./database";

/** A case as the public form leaves it, put straight into the database: the form has a limit an hour of its own. */
export async function putRequest({ name, answers = {} }: { name: string; answers?: Record<string, string> }): Promise<{ caseId: string; ref: string }> {
  const [customerId, caseId, now] = [randomUUID(), randomUUID(), new Date().toISOString().slice(0, 23).replace("T", " ")];
  return asAdmin(async (db) => {
    const year = new Date().getUTCFullYear();
    await db.query("INSERT INTO case_counters (year, last_number) VALUES (?, 1) ON DUPLICATE KEY UPDATE last_number = last_number + 1", [year]);
    const [{ n }] = await db.query<{ n: number }[]>("SELECT last_number AS n FROM case_counters WHERE year = ?", [year]);
    const ref = `${year % 100}-${String(n).padStart(4, "0")}`;
    await db.query("INSERT INTO customers (id, name, email, return_address, created_at) VALUES (?, ?, ?, ?, ?)", [customerId, name, "sender@parcels.example", "4 Reed Bank\nFennick ZZ0 8BD", now]);
    await db.query("INSERT INTO cases (id, ref, customer_id, damage, requested_at) VALUES (?, ?, ?, ?, ?)", [caseId, ref, customerId, "Power surge or lightning: the lamp went out and the drive with it", now]);
    const typed = { partNumber: "PN 4471-0093-B", serial: "9KQ3-70B8-D2", boardNumber: "BX 40-3179", boardRevision: "rev C", enclosure: "sent", ...answers };
    await db.query("INSERT INTO requests (id, case_id, token_hash, answers, address_digest, requested_at, expires_at) VALUES (?, ?, ?, ?, ?, ?, '9999-12-31')",
      [randomUUID(), caseId, randomBytes(32), JSON.stringify(typed), randomBytes(32), now]);
    return { caseId, ref };
  });
}
