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

const AT_ONCE = 200;

/** Puts a mail into the outbox, in the transaction of what it tells about: it goes out if and only if that happened. */
export async function queueMail(tx: Transaction, mail: MailInput): Promise<{ id: string }> {
  const [id] = await queueMails(tx, [mail]);
  return { id };
}

/** The same for many; answers their ids in the same order. */
export async function queueMails(tx: Transaction, mails: readonly MailInput[]): Promise<string[]> {
  // the newest seal leaves the house with every mail
  const seal = await newestSeal(tx);
  const rows = mails.map(({ to, subject, text, maskedText, kind = "other" }) => {
    const id = randomUUID();
    return [id, to, subject, withNewestSeal(maskedText, seal), sealText(id, withNewestSeal(text, seal)), kind];
  });
  for (let at = 0; at < rows.length; at += AT_ONCE) {
    const some = rows.slice(at, at + AT_ONCE);
    await connection().query(
      `INSERT INTO mails (id, recipient, subject, text_masked, sealed, kind, state, queued_at, next_attempt_at)
       VALUES ${some.map(() => "(?, ?, ?, ?, ?, ?, 'queued', UTC_TIMESTAMP(6), UTC_TIMESTAMP(6))").join(", ")}`,
      { replacements: some.flat(), transaction: tx },
    );
  }
  return rows.map(([id]) => id as string);
}
