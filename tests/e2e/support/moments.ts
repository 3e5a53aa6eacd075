import type { Connection } from "mariadb";
import { asAdmin } from "../../support/tamper";

/** Moments of a change at which a server can die, held open by locks so that the kill meets them for certain. */
export const MOMENTS = ["before anything is written", "with everything written and nothing committed", "with everything committed and nothing answered"] as const;
export type Moment = (typeof MOMENTS)[number];

export interface Change {
  driveId: string;
  key: string;
  /** the log's entry by which the change shows once it is committed */
  action: string;
}

const UNTIL_MS = 10_000;
const SETTLE_MS = 300;

/** Runs `send`, waits until the change has come to this moment, then `kill`; locks go only after the server is dead. */
export async function cutAt(moment: Moment, change: Change, send: () => Promise<unknown>, kill: () => Promise<void>): Promise<void> {
  await asAdmin((head) => asAdmin((receipt) => asAdmin(async (look) => {
    await head.beginTransaction();
    await receipt.beginTransaction();
    await head.query("SELECT seq FROM custody_heads WHERE chain_id = ? FOR UPDATE", [change.driveId]);
    const sent = send().catch(() => null);
    await seen(look, "SELECT COUNT(*) AS n FROM idempotency_keys WHERE idempotency_key = ?", [change.key]);
    if (moment === MOMENTS[0]) {
      // it waits for the chain's head now, or does so within this time
      await new Promise((done) => setTimeout(done, SETTLE_MS));
    } else {
      if (moment === MOMENTS[1]) {
        // held up at its very last statement, the receipt for its answer; all else can be seen before it is committed
        await receipt.query("SELECT status FROM idempotency_keys WHERE idempotency_key = ? FOR UPDATE", [change.key]);
        await look.query("SET SESSION TRANSACTION ISOLATION LEVEL READ UNCOMMITTED");
      }
      await head.commit();
      await seen(look, "SELECT COUNT(*) AS n FROM custody_entries WHERE chain_id = ? AND action = ?", [change.driveId, change.action]);
      if (moment === MOMENTS[1]) await new Promise((done) => setTimeout(done, SETTLE_MS));
    }
    await kill();
    await sent;
    await head.rollback();
    await receipt.rollback();
  })));
}

/** Asks without a pause: what follows a commit follows within a few milliseconds. */
async function seen(db: Connection, sql: string, values: unknown[]): Promise<void> {
  const until = Date.now() + UNTIL_MS;
  while (Date.now() < until) {
    const [{ n }] = await db.query<{ n: number | bigint }[]>(sql, values);
    if (Number(n) > 0) return;
  }
  throw new Error(`never seen: ${sql}`);
}
