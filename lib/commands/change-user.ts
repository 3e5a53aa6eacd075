import { hashPassword, oneTimePassword } from "@/lib/auth/password";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { UserChange } from "@/lib/schemas/user";
import { inTransaction, Session, type Transaction, User } from "@/models";
import { type AccountLimits, caseListInWords, checkLimits, keepCaseList, limitColumns, limitsOf, NO_LIMITS } from "./account-limits";
import { appendEntry } from "./append-entry";
import type { Change } from "./correct-facts";
import { forgetAttempts } from "./forget-attempts";
import { allow, notFound } from "./refuse";

/** Name, role, what an auditor may see and until when, switched off or on, a new one-time password. What it takes away counts at the next request. */
export async function changeUser(actor: Actor, userId: string, input: UserChange): Promise<{ id: string; password?: string }> {
  allow(actor, "user.manage");
  const password = input.newPassword ? oneTimePassword() : undefined;
  const passwordHash = password && (await hashPassword(password));
  return inTransaction(async (tx) => {
    const user = await User.findByPk(userId, { transaction: tx, lock: tx.LOCK.UPDATE });
    if (!user) throw notFound("account");
    if (user.id === actor.id && (input.disabled || (input.role && input.role !== "admin"))) {
      throw new AppError("rule-against", "You can't take your own admin role or switch yourself off: ask another admin.");
    }
    const changes: Change[] = [];
    if (input.name && input.name !== user.name) changes.push({ field: "name", from: user.name, to: input.name });
    if (input.role && input.role !== user.role) changes.push({ field: "role", from: user.role, to: input.role });
    const { limits, changes: limitChanges } = await changedLimits(tx, user, input);
    changes.push(...limitChanges);
    if (input.disabled !== undefined && input.disabled !== (user.disabledAt !== null)) changes.push({ field: "switched off", from: user.disabledAt !== null, to: input.disabled });
    if (password) changes.push({ field: "password", from: "one of their own", to: "a new one-time password" });
    if (changes.length === 0) throw new AppError("does-not-fit", "Nothing would change: these are the values on record.");
    await user.update({
      ...(input.name ? { name: input.name } : {}), ...(input.role ? { role: input.role } : {}),
      ...(limitChanges.length > 0 ? limitColumns(limits) : {}),
      ...(input.disabled === undefined ? {} : { disabledAt: input.disabled ? new Date() : null }),
      ...(passwordHash ? { passwordHash, mustChangePassword: true } : {}),
    }, { transaction: tx });
    if (limitChanges.length > 0) await keepCaseList(tx, userId, limits.cases);
    if (passwordHash) await forgetAttempts(user.email, tx);
    if (passwordHash || input.disabled) await Session.update({ endedAt: new Date() }, { where: { userId, endedAt: null }, transaction: tx });
    await appendEntry(tx, WORKSHOP_CHAIN, actor, "user.changed", { type: "user", id: userId }, { user: { id: userId, name: user.name }, changes });
    return { id: userId, ...(password ? { password } : {}) };
  });
}

/** What the account would carry. Another role than auditor takes the case list and the end date away. */
async function changedLimits(tx: Transaction, user: User, input: UserChange): Promise<{ limits: AccountLimits; changes: Change[] }> {
  const before = await limitsOf(tx, user);
  const role = input.role ?? user.role;
  const kept = role === "auditor" ? before : NO_LIMITS;
  const limits = { cases: input.cases === undefined ? kept.cases : input.cases, endsOn: input.endsOn === undefined ? kept.endsOn : input.endsOn };
  await checkLimits(tx, role, limits, before.endsOn);
  const [from, to] = [await caseListInWords(tx, before.cases), await caseListInWords(tx, limits.cases)];
  const changes: Change[] = [];
  if (from !== to) changes.push({ field: "cases", from, to });
  if (before.endsOn !== limits.endsOn) changes.push({ field: "ends", from: before.endsOn, to: limits.endsOn });
  return { limits, changes };
}
