import { SYSTEM, WORKSHOP_CHAIN } from "@/lib/core/words";
import { env } from "@/lib/env";
import { dayIn } from "@/lib/queries/workshop-day";
import { inTransaction, Seal, type Transaction } from "@/models";
import { lockChain } from "./append-entry";
import { databaseNow, type MadeSeal, sealNow } from "./make-seal";
import { witnessSeals } from "./witness-seals";

const EVERY_MS = 5 * 60_000;

/**
 * The day's own seal, once a calendar day of the workshop's time zone; null when it is made already. Of several that ask
 * at once one makes it. `clock` stands in for the database's, for tests.
 */
export function makeDailySeal(clock?: string): Promise<MadeSeal | null> {
  return inTransaction(async (tx) => {
    const now = clock ?? (await databaseNow(tx));
    if (!(await isDue(tx, now))) return null;
    // asked again behind the lock: another may have made it meanwhile
    await lockChain(tx, WORKSHOP_CHAIN);
    return (await isDue(tx, now)) ? (await sealNow(tx, SYSTEM, "daily", now)).seal : null;
  }, { receipt: false });
}

async function isDue(tx: Transaction, now: string): Promise<boolean> {
  const last = await Seal.findOne({ attributes: ["madeAt"], where: { cause: "daily" }, order: [["number", "DESC"]], transaction: tx });
  const { timeZone } = env();
  return !last || dayIn(timeZone, last.madeAt) < dayIn(timeZone, new Date(now));
}

// One look-out a process: the bundler may load this module more than once.
const shared = globalThis as unknown as { twinreadSeals?: { trouble: string } };

/** Looks now and every five minutes whether the day has its seal and the witness file all of them; it never keeps the process alive. */
export function startSeals(): void {
  if (shared.twinreadSeals) return;
  const seals = (shared.twinreadSeals = { trouble: "" });
  const look = async () => {
    try {
      await makeDailySeal();
      await witnessSeals();
      seals.trouble = "";
    } catch (error) {
      const trouble = (error as Error).message;
      // said once, not every five minutes while the database is away
      if (trouble !== seals.trouble) console.error("seals:", trouble);
      seals.trouble = trouble;
    }
  };
  const tick = async () => {
    await look();
    setTimeout(() => void tick(), EVERY_MS).unref();
  };
  void tick();
}
