import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { mailView } from "@/lib/queries/mails";
import type { MailView } from "@/lib/views";
import { connection, inTransaction, Mail } from "@/models";
import { allow, notFound } from "./refuse";

/** Gives a mail that was given up its tries back. */
export async function retryMail(actor: Actor, id: string): Promise<{ mail: MailView }> {
  allow(actor, "outbox.read");
  return inTransaction(async (tx) => {
    const mail = await Mail.findByPk(id, { transaction: tx, lock: tx.LOCK.UPDATE });
    if (!mail) throw notFound("mail");
    if (mail.state !== "dead") throw new AppError("rule-against", mail.state === "sent" ? "This mail was sent already." : "This mail is still being tried by itself. Wait for it.");
    await connection().query("UPDATE mails SET state = 'queued', attempts = 0, next_attempt_at = UTC_TIMESTAMP(6) WHERE id = ?", { replacements: [id], transaction: tx });
    return { mail: mailView(await mail.reload({ transaction: tx })) };
  });
}
