import { randomUUID } from "node:crypto";
import { QueryTypes } from "sequelize";
import type { Role } from "@/lib/core/words";
import { withNewestSeal } from "@/lib/mail/seal-text";
import { sealText } from "@/lib/mail/sealed-text";
import { newestSeal } from "@/lib/queries/seals";
import { connection, type Transaction } from "@/models";

const AT_ONCE = 200;

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
  // the newest seal leaves the house with every mail
  const whole = withNewestSeal(text, await newestSeal(tx));
  for (let at = 0; at < people.length; at += AT_ONCE) {
    const some = people.slice(at, at + AT_ONCE);
    const values = some.flatMap(({ email }) => {
      const id = randomUUID();
      return [id, email, subject, whole, sealText(id, whole), kind];
    });
    await connection().query(
      `INSERT INTO mails (id, recipient, subject, text_masked, sealed, kind, state, queued_at, next_attempt_at)
       VALUES ${some.map(() => "(?, ?, ?, ?, ?, ?, 'queued', UTC_TIMESTAMP(6), UTC_TIMESTAMP(6))").join(", ")}`,
      { replacements: values, transaction: tx },
    );
  }
  return people.length;
}
