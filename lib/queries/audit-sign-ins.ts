import { Op, type Order, type WhereOptions } from "sequelize";
import { dayStart, sessionEnd } from "@/lib/core/audit";
import type { SessionRow, TokenRow } from "@/lib/core/audit-rows";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { SESSION_ABSOLUTE_SECONDS, SESSION_IDLE_SECONDS } from "@/lib/limits";
import type { AuditInput } from "@/lib/schemas/audit";
import { BenchToken, Session, User } from "@/models";
import { allowWorkshopAudit } from "./audit-rights";

const like = (q: string) => ({ [Op.like]: `%${q.trim().replace(/[\\%_]/g, (c) => `\\${c}`)}%` });
const user = { model: User, as: "user", attributes: ["name", "role"], required: true };
const byWho = (direction: string) => [{ model: User, as: "user" }, "name", direction] as const;
const userOf = (row: unknown) => (row as { user: User }).user;

function within(input: AuditInput): WhereOptions {
  const zone = env().timeZone;
  const range = { ...(input.from ? { [Op.gte]: new Date(dayStart(input.from, zone)) } : {}), ...(input.to ? { [Op.lt]: new Date(dayStart(input.to, zone, 1)) } : {}) };
  return input.from || input.to ? { createdAt: range } : {};
}

/** Every session that was opened with a right password, the latest first. */
export async function auditSessions(actor: Actor, input: AuditInput): Promise<{ items: SessionRow[]; total: number; page: number; pageSize: number }> {
  allowWorkshopAudit(actor);
  const direction = input.order === "asc" ? "ASC" : "DESC";
  const order: Order = [input.sort === "who" ? [...byWho(direction)] : [input.sort === "last" ? "lastSeenAt" : input.sort === "ended" ? "endedAt" : "createdAt", direction], ["createdAt", direction], ["id", "ASC"]];
  const { rows, count } = await Session.findAndCountAll({
    where: { [Op.and]: [within(input), input.what === "open" ? { endedAt: null } : input.what === "ended" ? { endedAt: { [Op.ne]: null } } : {}, input.q.trim() ? { "$user.name$": like(input.q) } : {}] } as WhereOptions,
    include: [user], order, limit: input.pageSize, offset: (input.page - 1) * input.pageSize, subQuery: false,
  });
  const now = new Date();
  const items = rows.map((row): SessionRow => ({
    who: userOf(row).name, role: userOf(row).role, from: row.createdAt.toISOString(), lastStep: row.lastSeenAt.toISOString(), ended: row.endedAt?.toISOString() ?? null,
    how: sessionEnd({ createdAt: row.createdAt, lastSeenAt: row.lastSeenAt, endedAt: row.endedAt ?? null }, now, SESSION_IDLE_SECONDS, SESSION_ABSOLUTE_SECONDS),
  }));
  return { items, total: count, page: input.page, pageSize: input.pageSize };
}

/** Bench tokens made, used and withdrawn. */
export async function auditTokens(actor: Actor, input: AuditInput): Promise<{ items: TokenRow[]; total: number; page: number; pageSize: number }> {
  allowWorkshopAudit(actor);
  const direction = input.order === "asc" ? "ASC" : "DESC";
  const column = input.sort === "used" ? "lastUsedAt" : input.sort === "withdrawn" ? "withdrawnAt" : input.sort === "name" ? "name" : "createdAt";
  const order: Order = [input.sort === "who" ? [...byWho(direction)] : [column, direction], ["createdAt", direction], ["id", "ASC"]];
  const { rows, count } = await BenchToken.findAndCountAll({
    where: { [Op.and]: [within(input), input.what === "open" ? { withdrawnAt: null } : input.what === "withdrawn" ? { withdrawnAt: { [Op.ne]: null } } : {}, input.q.trim() ? { [Op.or]: [{ "$user.name$": like(input.q) }, { name: like(input.q) }] } : {}] } as WhereOptions,
    attributes: { exclude: ["tokenHash"] }, include: [user], order, limit: input.pageSize, offset: (input.page - 1) * input.pageSize, subQuery: false,
  });
  const items = rows.map((row): TokenRow => ({
    name: row.name, who: userOf(row).name, role: userOf(row).role, made: row.createdAt.toISOString(), lastUsed: row.lastUsedAt?.toISOString() ?? null, withdrawn: row.withdrawnAt?.toISOString() ?? null,
  }));
  return { items, total: count, page: input.page, pageSize: input.pageSize };
}
