import { Op } from "sequelize";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { REQUEST_TRIES_AN_HOUR, REQUESTS_AN_HOUR, REQUESTS_AN_HOUR_PER_ADDRESS, REQUESTS_AT_ONCE_PER_ADDRESS } from "@/lib/limits";
import { Request, type Transaction } from "@/models";
import { hourly } from "./hourly";

const HOUR_MS = 3_600_000;
const tries = hourly(REQUEST_TRIES_AN_HOUR);

function refusal(why: string, waitMs: number): AppError {
  const { email, phone } = env().workshopContact;
  const way = phone ? `phone us: ${phone}` : email ? `write to ${email}` : "phone us";
  const minutes = Math.max(1, Math.ceil(waitMs / 60_000));
  return new AppError("too-many", `${why} Try again in ${minutes} ${minutes === 1 ? "minute" : "minutes"}, or ${way}.`, { retryAfterSeconds: Math.max(1, Math.ceil(waitMs / 1000)) });
}

/** Counts a try before its body is taken in, refused ones too. */
export function noteTry(address: Buffer, now = Date.now()): void {
  const waitMs = tries.note(address.toString("hex"), now);
  if (waitMs !== null) throw refusal("Many tries came from where you are within the last hour.", waitMs);
}

const underWay = new Map<string, number>();

/** Runs while at most a few other calls from the same address are under way: nobody keeps the form busy alone. */
export async function inAddressTurn<T>(address: Buffer, run: () => Promise<T>): Promise<T> {
  const key = address.toString("hex");
  const count = underWay.get(key) ?? 0;
  if (count >= REQUESTS_AT_ONCE_PER_ADDRESS) throw new AppError("too-many", "Other requests from where you are are still on their way. Send again in a few seconds; nothing was stored.", { retryAfterSeconds: 5 });
  underWay.set(key, count + 1);
  try {
    return await run();
  } finally {
    const left = underWay.get(key)! - 1;
    if (left > 0) underWay.set(key, left);
    else underWay.delete(key);
  }
}

/** Whether one more request may come in from here, and at all. Inside a transaction that holds the case counter it is exact. */
export async function requireRequestRoom(address: Buffer, tx?: Transaction, now = Date.now()): Promise<void> {
  // what a clock that was wrong for a while has dated ahead counts for nothing
  const since = { requestedAt: { [Op.gt]: new Date(now - HOUR_MS), [Op.lte]: new Date(now + 60_000) } };
  const limits = [
    { where: { ...since, addressDigest: address }, most: REQUESTS_AN_HOUR_PER_ADDRESS, why: "Many requests came from where you are within the last hour." },
    { where: since, most: REQUESTS_AN_HOUR, why: "Very many requests came in within the last hour." },
  ];
  for (const { where, most, why } of limits) {
    if ((await Request.count({ where, transaction: tx })) < most) continue;
    const oldest = await Request.findOne({ where, order: [["requestedAt", "DESC"]], offset: most - 1, transaction: tx });
    throw refusal(why, (oldest?.requestedAt.getTime() ?? now) + HOUR_MS - now);
  }
}
