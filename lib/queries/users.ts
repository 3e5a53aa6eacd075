import { QueryTypes } from "sequelize";
import { allow, notFound } from "@/lib/commands/refuse";
import { lastDayOf } from "@/lib/core/account-end";
import type { Actor, Role } from "@/lib/core/words";
import { env } from "@/lib/env";
import type { BenchTokenView, UserView } from "@/lib/views";
import { BenchToken, connection } from "@/models";

interface Row {
  id: string;
  email: string;
  name: string;
  role: Role;
  disabled_at: Date | null;
  must_change_password: number;
  last_seen_at: Date | null;
  ends_at: Date | string | null;
  limited: number;
}

async function users(where: string, replacements: string[]): Promise<UserView[]> {
  const rows = await connection().query<Row>(
    `SELECT users.*, (SELECT MAX(last_seen_at) FROM sessions WHERE sessions.user_id = users.id) AS last_seen_at FROM users ${where} ORDER BY users.name`,
    { replacements, type: QueryTypes.SELECT },
  );
  const lists = await connection().query<{ user_id: string; id: string; ref: string }>(
    "SELECT user_cases.user_id, cases.id, cases.ref FROM user_cases JOIN cases ON cases.id = user_cases.case_id ORDER BY cases.ref", { type: QueryTypes.SELECT },
  );
  return rows.map((row) => ({
    ...limitsOf(row, lists),
    id: row.id, email: row.email, name: row.name, role: row.role, disabled: row.disabled_at !== null,
    mustChangePassword: Boolean(row.must_change_password), lastSeenAt: row.last_seen_at ? new Date(row.last_seen_at).toISOString() : null,
  }));
}

function limitsOf(row: Row, lists: { user_id: string; id: string; ref: string }[]): Pick<UserView, "endsOn" | "ended" | "cases"> {
  const endsAt = row.ends_at === null ? null : new Date(row.ends_at);
  return {
    endsOn: endsAt && lastDayOf(endsAt, env().timeZone), ended: endsAt !== null && endsAt.getTime() <= Date.now(),
    cases: row.limited ? lists.filter((one) => one.user_id === row.id).map(({ id, ref }) => ({ id, ref })) : null,
  };
}

export async function userList(actor: Actor): Promise<UserView[]> {
  allow(actor, "user.manage");
  return users("", []);
}

export async function tokenList(actor: Actor): Promise<BenchTokenView[]> {
  const rows = await BenchToken.findAll({ where: { userId: actor.id }, order: [["createdAt", "DESC"]] });
  return rows.map((row) => ({
    id: row.id, name: row.name, createdAt: row.createdAt.toISOString(), lastUsedAt: row.lastUsedAt?.toISOString() ?? null, withdrawnAt: row.withdrawnAt?.toISOString() ?? null,
  }));
}

/** One's own account. */
export async function accountView(actor: Actor): Promise<{ user: UserView; tokens: BenchTokenView[] }> {
  const [user] = await users("WHERE users.id = ?", [actor.id]);
  if (!user) throw notFound("account");
  return { user, tokens: await tokenList(actor) };
}
