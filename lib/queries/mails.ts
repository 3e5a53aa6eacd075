import { Op } from "sequelize";
import { allow } from "@/lib/commands/refuse";
import type { Actor } from "@/lib/core/words";
import type { ListInput } from "@/lib/schemas/case";
import type { ListView, MailView } from "@/lib/views";
import { Mail } from "@/models";

export function mailView(row: Mail): MailView {
  return {
    id: row.id, to: row.recipient, subject: row.subject, text: row.textMasked, state: row.state, attempts: row.attempts ?? 0,
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
