import { QueryTypes } from "sequelize";
import type { Role } from "@/lib/core/words";
import { connection, type Transaction } from "@/models";
import { queueMails } from "./queue-mail";

export interface Alarm {
  roles: readonly Role[];
  /** the case it is about: a limited auditor without it gets no mail; null for what is about no case */
  caseId: string | null;
  subject: string;
  /** no customer's name, no secret */
  text: string;
  /** which template made it */
  kind?: string;
}

/** One mail to every active account of these roles, in the transaction of what it tells about. Answers how many. */
export async function queueAlarm(tx: Transaction, { roles, caseId, subject, text, kind = "other" }: Alarm): Promise<number> {
  const people = await connection().query<{ email: string }>(
    `SELECT email FROM users WHERE role IN (:roles) AND disabled_at IS NULL AND (ends_at IS NULL OR ends_at > UTC_TIMESTAMP(6))
       AND (NOT limited OR EXISTS (SELECT 1 FROM user_cases uc WHERE uc.user_id = users.id AND uc.case_id = :caseId)) ORDER BY email`,
    { replacements: { roles, caseId }, transaction: tx, type: QueryTypes.SELECT },
  );
  await queueMails(tx, people.map(({ email }) => ({ to: email, subject, text, maskedText: text, kind })));
  return people.length;
}
