import { dayInWords, lastDayOf } from "@/lib/core/account-end";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { type User, UserCase } from "@/models";

/** Past its end date an account is like one that is switched off. */
export function hasEnded(user: Pick<User, "endsAt">, now = Date.now()): boolean {
  return user.endsAt !== null && user.endsAt.getTime() <= now;
}

/** "31 January 2027" of an account with an end date. */
export function lastDayInWords(user: Pick<User, "endsAt">): string {
  return dayInWords(lastDayOf(user.endsAt!, env().timeZone));
}

/** A user as whoever acts. The case list is read afresh each time: what an admin takes off it is gone at the next request. */
export async function actorOfUser(user: User): Promise<Actor> {
  const actor = { id: user.id, name: user.name, role: user.role };
  if (!user.limited) return actor;
  const rows = await UserCase.findAll({ where: { userId: user.id } });
  return { ...actor, cases: rows.map((row) => row.caseId) };
}
