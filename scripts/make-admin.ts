import { hashPassword, oneTimePassword } from "@/lib/auth/password";
import { appendEntry } from "@/lib/commands/append-entry";
import type { Change } from "@/lib/commands/correct-facts";
import { createUser } from "@/lib/commands/create-user";
import { introduceKey } from "@/lib/commands/introduce-key";
import { SYSTEM, WORKSHOP_CHAIN } from "@/lib/core/words";
import { userInput } from "@/lib/schemas/user";
import { inTransaction, Session, User } from "@/models";
import { CommandRefusal, runCommand } from "./commands/run-command";

// `npm run admin -- <e-mail> [name]`: makes an admin, or gives an account back to somebody who is locked out.
await runCommand(async ([address, ...words]) => {
  if (!address) throw new CommandRefusal("Give an e-mail address: npm run admin -- <e-mail> [name]");
  const parsed = userInput.safeParse({ email: address, name: words.join(" ") || address.split("@")[0], role: "admin" });
  if (!parsed.success) throw new CommandRefusal(parsed.error.issues.map((issue) => issue.message).join("\n"));
  await introduceKey();
  const known = await User.findOne({ where: { email: parsed.data.email } });
  const password = known ? await giveBack(known.id) : (await createUser(SYSTEM, parsed.data)).password;
  console.log(`${known ? "The account is an admin's and switched on" : "Made an admin account"}: ${parsed.data.email}`);
  console.log("This password works once; the first sign-in asks for another:");
  console.log(password);
});

/** Admin, switched on, a new one-time password; whoever was signed in with the old one is signed out. */
async function giveBack(userId: string): Promise<string> {
  const password = oneTimePassword();
  const passwordHash = await hashPassword(password);
  return inTransaction(async (tx) => {
    const user = await User.findByPk(userId, { transaction: tx, lock: tx.LOCK.UPDATE, rejectOnEmpty: true });
    const changes: Change[] = [];
    if (user.role !== "admin") changes.push({ field: "role", from: user.role, to: "admin" });
    if (user.disabledAt) changes.push({ field: "switched off", from: true, to: false });
    changes.push({ field: "password", from: "one of their own", to: "a new one-time password" });
    await user.update({ role: "admin", disabledAt: null, passwordHash, mustChangePassword: true }, { transaction: tx });
    await Session.update({ endedAt: new Date() }, { where: { userId, endedAt: null }, transaction: tx });
    await appendEntry(tx, WORKSHOP_CHAIN, SYSTEM, "user.changed", { type: "user", id: userId }, { user: { id: userId, name: user.name }, changes });
    return password;
  });
}
