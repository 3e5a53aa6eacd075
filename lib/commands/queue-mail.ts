import { randomUUID } from "node:crypto";
import { withNewestSeal } from "@/lib/mail/seal-text";
import { sealText } from "@/lib/mail/sealed-text";
import { newestSeal } from "@/lib/queries/seals";
import { connection, type Transaction } from "@/models";

export interface MailInput {
  to: string;
  subject: string;
  /** with its secret links; sealed until it is sent, then wiped */
  text: string;
  /** what the outbox page shows: the same with secret links masked */
  maskedText: string;
  /** which template made it */
  kind?: string;
}

/** Puts a mail into the outbox, in the transaction of what it tells about: it goes out if and only if that happened. */
export async function queueMail(tx: Transaction, { to, subject, text, maskedText, kind = "other" }: MailInput): Promise<{ id: string }> {
  const id = randomUUID();
  // the newest seal leaves the house with every mail
  const seal = await newestSeal(tx);
  await connection().query(
    `INSERT INTO mails (id, recipient, subject, text_masked, sealed, kind, state, queued_at, next_attempt_at)
     VALUES (?, ?, ?, ?, ?, ?, 'queued', UTC_TIMESTAMP(6), UTC_TIMESTAMP(6))`,
    { replacements: [id, to, subject, withNewestSeal(maskedText, seal), sealText(id, withNewestSeal(text, seal)), kind], transaction: tx },
  );
  return { id };
}
