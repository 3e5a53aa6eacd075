import { randomUUID } from "node:crypto";
import { UniqueConstraintError } from "sequelize";
import { hashPassword, oneTimePassword } from "@/lib/auth/password";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { UserInput } from "@/lib/schemas/user";
import { inTransaction, User } from "@/models";
import { caseListInWords, checkLimits, keepCaseList, limitColumns } from "./account-limits";
import { appendEntry } from "./append-entry";
import { allow } from "./refuse";

/** Makes an account with a password that works once: its owner chooses another at the first sign-in. */
export async function createUser(actor: Actor, input: UserInput, password = oneTimePassword(), mustChangePassword = true): Promise<{ user: { id: string; email: string }; password: string }> {
  if (actor.role !== "system") allow(actor, "user.manage");
  const passwordHash = await hashPassword(password);
  try {
    return await inTransaction(async (tx) => {
      const limits = { cases: input.cases ?? null, endsOn: input.endsOn ?? null };
      await checkLimits(tx, input.role, limits);
      const user = await User.create({
        id: randomUUID(), email: input.email, name: input.name, role: input.role, passwordHash, mustChangePassword, createdAt: new Date(), ...limitColumns(limits),
      }, { transaction: tx });
      await keepCaseList(tx, user.id, limits.cases);
      await appendEntry(tx, WORKSHOP_CHAIN, actor, "user.created", { type: "user", id: user.id }, {
        user: { id: user.id, name: user.name }, role: user.role,
        ...(limits.cases ? { cases: await caseListInWords(tx, limits.cases) } : {}), ...(limits.endsOn ? { ends: limits.endsOn } : {}),
      });
      return { user: { id: user.id, email: user.email }, password };
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new AppError("rule-against", "There is an account with this e-mail address already. Change that one instead.");
    throw error;
  }
}
