import { Op } from "sequelize";
import { appendEntry } from "@/lib/commands/append-entry";
import { accountDigest } from "@/lib/commands/forget-attempts";
import { SYSTEM, WORKSHOP_CHAIN } from "@/lib/core/words";
import { inTransaction, SignInAttempt } from "@/models";

const WINDOW_MS = 15 * 60_000;
/** wrong passwords in the window: for one account from one address, for one address, for one account from anywhere */
const PAIR = 8;
const ADDRESS = 40;
const ACCOUNT = 60;

let turn: Promise<unknown> = Promise.resolve();

/**
 * Whether this sign-in may be tried at all. The try is noted first and counted with the others, one after the other:
 * a hundred at once must not all find the count at nothing. The limit by account alone is wide, so that a stranger
 * cannot shut a colleague out with a handful of guesses; by account and address together it is narrow.
 */
export function mayTry(email: string, address: string): Promise<boolean> {
  const mine = turn.then(() => noteAndCount(accountDigest(email), address.slice(0, 64)));
  turn = mine.catch(() => {});
  return mine;
}

async function noteAndCount(account: Buffer, address: string): Promise<boolean> {
  const mine = await SignInAttempt.create({ account, address, at: new Date() });
  const at = { [Op.gt]: new Date(Date.now() - WINDOW_MS) };
  const past = [
    (await SignInAttempt.count({ where: { account, address, at } })) - PAIR,
    (await SignInAttempt.count({ where: { address, at } })) - ADDRESS,
    (await SignInAttempt.count({ where: { account, at } })) - ACCOUNT,
  ];
  if (past.every((over) => over <= 0)) return true;
  // the first past a limit is written down; the others leave no trace, so that trying on shuts nobody out for longer
  if (past.includes(1)) await inTransaction((tx) => appendEntry(tx, WORKSHOP_CHAIN, SYSTEM, "sign-in.limited", { type: "user", id: SYSTEM.id }, { address, accountDigest: account.toString("hex") }));
  else await mine.destroy();
  return false;
}

/** After a right password the pair starts afresh; old rows of all go with it. */
export async function clearAttempts(email: string, address: string): Promise<void> {
  await SignInAttempt.destroy({ where: { [Op.or]: [{ account: accountDigest(email), address }, { at: { [Op.lt]: new Date(Date.now() - WINDOW_MS) } }] } });
}
