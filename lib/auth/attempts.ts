import { createHash } from "node:crypto";
import { Op } from "sequelize";
import { appendEntry } from "@/lib/commands/append-entry";
import { SYSTEM, WORKSHOP_CHAIN } from "@/lib/core/words";
import { inTransaction, SignInAttempt, type Transaction } from "@/models";

const WINDOW_MS = 15 * 60_000;
/** wrong passwords in the window: for one account from one address, for one address, for one account from anywhere */
const PAIR = 8;
const ADDRESS = 40;
const ACCOUNT = 60;

export const accountDigest = (email: string) => createHash("sha256").update(email.trim().toLowerCase()).digest();

/**
 * Whether this sign-in may be tried at all. The limit by account alone is wide, so that a stranger cannot shut a
 * colleague out with a handful of guesses; by account and address together it is narrow.
 */
export async function mayTry(email: string, address: string): Promise<boolean> {
  const account = accountDigest(email);
  const at = { [Op.gt]: new Date(Date.now() - WINDOW_MS) };
  const [pair, fromAddress, onAccount] = await Promise.all([
    SignInAttempt.count({ where: { account, address, at } }),
    SignInAttempt.count({ where: { address, at } }),
    SignInAttempt.count({ where: { account, at } }),
  ]);
  const allowed = pair < PAIR && fromAddress < ADDRESS && onAccount < ACCOUNT;
  if (!allowed && (pair === PAIR || fromAddress === ADDRESS || onAccount === ACCOUNT)) {
    await noteAttempt(email, address);
    await inTransaction((tx) => appendEntry(tx, WORKSHOP_CHAIN, SYSTEM, "sign-in.limited", { type: "user", id: SYSTEM.id }, { address, accountDigest: account.toString("hex") }));
  }
  return allowed;
}

export async function noteAttempt(email: string, address: string): Promise<void> {
  await SignInAttempt.create({ account: accountDigest(email), address: address.slice(0, 64), at: new Date() });
}

/** After a right password the pair starts afresh; old rows of all go with it. */
export async function clearAttempts(email: string, address: string): Promise<void> {
  await SignInAttempt.destroy({ where: { [Op.or]: [{ account: accountDigest(email), address }, { at: { [Op.lt]: new Date(Date.now() - WINDOW_MS) } }] } });
}

/** An admin's new one-time password is the way out for who is shut out: the account's tries are forgotten with it. */
export async function forgetAttempts(email: string, tx: Transaction): Promise<void> {
  await SignInAttempt.destroy({ where: { account: accountDigest(email) }, transaction: tx });
}
