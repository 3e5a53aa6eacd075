import { QueryTypes } from "sequelize";
import { openText } from "@/lib/mail/sealed-text";
import { maybeTaken, refusedForGood, type SendMail, sendMail, WHOLE_MS } from "@/lib/mail/transport";
import { connection, inTransaction, Mail } from "@/models";

export const MAX_TRIES = 8;
/** longer than any try may take */
const LEASE_SECONDS = (2 * WHOLE_MS) / 1000;
const FIRST_WAIT_SECONDS = 30;
const LONGEST_WAIT_SECONDS = 3600;
const AT_MOST = 100;

interface Claimed {
  mail: Mail;
  /** this try's number: who comes back under an older one changes nothing any more */
  attempt: number;
}

export interface Delivered {
  sent: number;
  again: number;
  dead: number;
}

/**
 * Sends what is due, one after the other; several workers may run side by side. Times are the database's. A mail is
 * lost never and doubled only when a server died between the receiver's yes and our note of it.
 */
export async function deliverMails(send: SendMail = sendMail): Promise<Delivered> {
  const done: Delivered = { sent: 0, again: 0, dead: 0 };
  for (let i = 0; i < AT_MOST; i += 1) {
    const claimed = await claim();
    if (!claimed) break;
    done[await deliver(claimed, send)] += 1;
  }
  return done;
}

/** Takes one due mail, or one whose sender died: its lease ran out while it was being sent. */
async function claim(): Promise<Claimed | null> {
  return inTransaction(async (tx) => {
    const [due] = await connection().query<{ id: string; state: Mail["state"] }>(
      `SELECT id, state FROM mails
       WHERE (state = 'queued' AND next_attempt_at <= UTC_TIMESTAMP(6)) OR (state = 'sending' AND leased_until < UTC_TIMESTAMP(6))
       ORDER BY next_attempt_at LIMIT 1 FOR UPDATE SKIP LOCKED`,
      { transaction: tx, type: QueryTypes.SELECT },
    );
    if (!due) return null;
    await connection().query(
      `UPDATE mails SET possible_duplicate = possible_duplicate OR state = 'sending', state = 'sending', attempts = attempts + 1,
       leased_until = UTC_TIMESTAMP(6) + INTERVAL ? SECOND WHERE id = ?`,
      { replacements: [LEASE_SECONDS, due.id], transaction: tx },
    );
    const mail = (await Mail.findByPk(due.id, { transaction: tx }))!;
    return { mail, attempt: mail.attempts ?? 1 };
  }, { receipt: false });
}

async function deliver({ mail, attempt }: Claimed, send: SendMail): Promise<keyof Delivered> {
  let text: string;
  try {
    if (!mail.sealed) throw new Error("no text");
    text = openText(mail.id, mail.sealed);
  } catch {
    return give(mail, attempt, "dead", "The text can't be opened with the outbox key of this data folder. Put the former key back from your backup, then try again.");
  }
  try {
    await send({ id: mail.id, to: mail.recipient, subject: mail.subject, text });
  } catch (error) {
    const last = attempt >= MAX_TRIES || refusedForGood(error);
    return give(mail, attempt, last ? "dead" : "again", sayWhy(error), maybeTaken(error));
  }
  return give(mail, attempt, "sent", mail.possibleDuplicate ? "An earlier try broke off before its end was known: this mail may have arrived twice." : null);
}

/** Doubles from half a minute to an hour, give or take a quarter, so that many mails don't come back at once. */
export function waitSeconds(attempt: number, chance: number): number {
  const base = Math.min(FIRST_WAIT_SECONDS * 2 ** (attempt - 1), LONGEST_WAIT_SECONDS);
  return Math.round(base * (0.75 + chance / 2));
}

async function give(mail: Mail, attempt: number, result: keyof Delivered, why: string | null, doubtful = false): Promise<keyof Delivered> {
  const state = { sent: "sent", again: "queued", dead: "dead" }[result];
  const sent = result === "sent" ? ", sealed = NULL, sent_at = UTC_TIMESTAMP(6)" : "";
  await connection().query(
    `UPDATE mails SET possible_duplicate = possible_duplicate OR ?, state = ?, last_error = ?, leased_until = NULL, next_attempt_at = UTC_TIMESTAMP(6) + INTERVAL ? SECOND${sent}
     WHERE id = ? AND state = 'sending' AND attempts = ?`,
    { replacements: [doubtful, state, why, result === "again" ? waitSeconds(attempt, Math.random()) : 0, mail.id, attempt] },
  );
  return result;
}

/** What the other side said, for the admin; nothing that could be a secret of a link stays in it. */
function sayWhy(error: unknown): string {
  const text = error instanceof Error ? error.message : String(error);
  return text.replace(/[A-Za-z0-9_-]{43,}/g, "…").replace(/\s+/g, " ").slice(0, 500);
}
