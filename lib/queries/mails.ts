import { Op } from "sequelize";
import { allow } from "@/lib/commands/refuse";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { mailHtml } from "@/lib/mail/mail-html";
import { mailTemplates, type Template } from "@/lib/mail/templates";
import type { ListInput } from "@/lib/schemas/case";
import type { ListView, MailView } from "@/lib/views";
import { Mail } from "@/models";

export function mailView(row: Mail): MailView {
  return {
    id: row.id, to: row.recipient, subject: row.subject, text: row.textMasked, html: mailHtml(row.textMasked, { subject: row.subject, workshop: env().workshop }), possibleDuplicate: row.possibleDuplicate ?? false, state: row.state, attempts: row.attempts ?? 0,
    queuedAt: row.queuedAt.toISOString(), sentAt: row.sentAt?.toISOString() ?? null, lastError: row.lastError ?? null,
  };
}

/** The outbox, latest first; what is sealed stays sealed. */
export async function mailList(actor: Actor, input: ListInput): Promise<ListView<MailView>> {
  allow(actor, "outbox.read");
  const q = input.q.trim();
  const like = { [Op.like]: `%${q.replace(/[\\%_]/g, (c) => `\\${c}`)}%` };
  const { rows, count } = await Mail.findAndCountAll({
    attributes: { exclude: ["sealed"] }, where: q ? { [Op.or]: [{ recipient: like }, { subject: like }] } : {},
    order: [["queuedAt", "DESC"], ["id", "ASC"]], limit: input.pageSize, offset: (input.page - 1) * input.pageSize,
  });
  return { items: rows.map(mailView), total: count, page: input.page, pageSize: input.pageSize };
}

/** What Twinread writes to people outside, with invented facts. */
export function templateList(actor: Actor): (Template & { html: string })[] {
  allow(actor, "outbox.read");
  const { workshop, timeZone } = env();
  return mailTemplates({ workshop, timeZone }).map((one) => ({ ...one, html: mailHtml(one.text, { subject: one.subject, workshop }) }));
}
