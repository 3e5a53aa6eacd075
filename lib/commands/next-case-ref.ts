import { QueryTypes } from "sequelize";
import { caseRef } from "@/lib/core/case-number";
import { env } from "@/lib/env";
import { connection, type Transaction } from "@/models";

/** The next case number of the year in the workshop's time zone. Its counter stays locked until the transaction ends. */
export async function nextCaseRef(tx: Transaction, now: Date): Promise<string> {
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
