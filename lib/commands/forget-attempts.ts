import { createHash } from "node:crypto";
import { SignInAttempt, type Transaction } from "@/models";

/** Under what the tries of an account are kept: people mistype passwords there. */
export const accountDigest = (email: string) => createHash("sha256").update(email.trim().toLowerCase()).digest();

/** An admin's new one-time password is the way out for who is shut out: the account's tries are forgotten with it. */
export async function forgetAttempts(email: string, tx: Transaction): Promise<void> {
  await SignInAttempt.destroy({ where: { account: accountDigest(email) }, transaction: tx });
}
