import { QueryTypes } from "sequelize";
import { env } from "@/lib/env";
import { sealMailSubject, sealMailText } from "@/lib/mail/seal-text";
import { connection, type Transaction } from "@/models";
import type { MadeSeal } from "./make-seal";
import { queueMail } from "./queue-mail";

/** Takes a seal out of the house: to every auditor whose account is open, also those who see a few cases only. A seal tells of none. */
export async function mailSeal(tx: Transaction, seal: MadeSeal): Promise<void> {
  const auditors = await connection().query<{ email: string }>(
    "SELECT email FROM users WHERE role = 'auditor' AND disabled_at IS NULL AND (ends_at IS NULL OR ends_at > UTC_TIMESTAMP(6)) ORDER BY id",
    { transaction: tx, type: QueryTypes.SELECT },
  );
  const { workshop } = env();
  const text = sealMailText({ workshop, ...seal });
  for (const { email } of auditors) await queueMail(tx, { to: email, subject: sealMailSubject(seal.number, workshop), text, maskedText: text });
}
