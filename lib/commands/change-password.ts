import { Op } from "sequelize";
import { hashPassword, passwordFits } from "@/lib/auth/password";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { PasswordInput } from "@/lib/schemas/user";
import { inTransaction, Session, User } from "@/models";
import { appendEntry } from "./append-entry";
import { notFound } from "./refuse";

/** One's own password. The route ends the other sessions of the account right after. */
export async function changePassword(actor: Actor, input: PasswordInput): Promise<{ changed: true }> {
  const user = await User.findByPk(actor.id);
  if (!user) throw notFound("account");
  if (!(await passwordFits(user.passwordHash, input.current))) {
    throw new AppError("does-not-fit", "Your present password is different. Type it again.", { errors: [{ path: "current", message: "This isn't your present password." }] });
  }
  if (input.next === input.current) throw new AppError("does-not-fit", "Choose a password that differs from the present one.", { errors: [{ path: "next", message: "Choose another one." }] });
  if (input.next.toLowerCase().includes(user.email.split("@")[0].toLowerCase())) {
    throw new AppError("does-not-fit", "Choose a password without your own name in it.", { errors: [{ path: "next", message: "It contains your own name." }] });
  }
  const passwordHash = await hashPassword(input.next);
  await inTransaction(async (tx) => {
    await User.update({ passwordHash, mustChangePassword: false }, { where: { id: actor.id }, transaction: tx });
    await appendEntry(tx, WORKSHOP_CHAIN, actor, "user.changed", { type: "user", id: actor.id }, {
      user: { id: actor.id, name: user.name }, changes: [{ field: "password", from: "the former one", to: "a new one of their own" }],
    });
  });
  return { changed: true };
}

/** Ends every session of this account but the one that asks. */
export async function endOtherSessions(actor: Actor, keepSessionId: string | null): Promise<{ ended: number }> {
  const [ended] = await Session.update({ endedAt: new Date() }, { where: { userId: actor.id, endedAt: null, ...(keepSessionId ? { id: { [Op.ne]: keepSessionId } } : {}) } });
  return { ended };
}
