import { randomBytes, randomUUID } from "node:crypto";
import { tokenHash } from "@/lib/auth/token";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { BenchToken, inTransaction, User } from "@/models";
import { appendEntry } from "./append-entry";
import { notFound } from "./refuse";

/** A token for a bench station: 256 random bits, shown once, stored as a hash, with the rights of its owner. */
export async function createBenchToken(actor: Actor, input: { name: string; userId: string }): Promise<{ id: string; name: string; token: string }> {
  const user = await User.findByPk(input.userId);
  if (!user) throw notFound("account");
  if (actor.role !== "system" && actor.id !== user.id) throw new AppError("forbidden", "A bench token is made by its owner, on their own account page.");
  if (user.disabledAt) throw new AppError("rule-against", "This account is switched off. Ask the admin to switch it on first.");
  const token = randomBytes(32).toString("base64url");
  return inTransaction(async (tx) => {
    const row = await BenchToken.create({ id: randomUUID(), userId: user.id, name: input.name, tokenHash: tokenHash(token), createdAt: new Date() }, { transaction: tx });
    await appendEntry(tx, WORKSHOP_CHAIN, actor, "token.made", { type: "token", id: row.id }, { user: { id: user.id, name: user.name }, token: row.id, name: row.name });
    return { id: row.id, name: row.name, token };
  }, { receipt: false });
}

export async function withdrawBenchToken(actor: Actor, tokenId: string): Promise<{ id: string }> {
  const row = await BenchToken.findByPk(tokenId);
  if (!row || row.userId !== actor.id) throw notFound("bench token");
  return inTransaction(async (tx) => {
    if (row.withdrawnAt) throw new AppError("rule-against", "This token was withdrawn already.");
    await row.update({ withdrawnAt: new Date() }, { transaction: tx });
    await appendEntry(tx, WORKSHOP_CHAIN, actor, "token.withdrawn", { type: "token", id: row.id }, { user: { id: actor.id, name: actor.name }, token: row.id, name: row.name });
    return { id: row.id };
  });
}
