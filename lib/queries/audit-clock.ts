import { QueryTypes } from "sequelize";
import { clockOffset, type ClockReading } from "@/lib/core/audit";
import type { Actor } from "@/lib/core/words";
import { connection } from "@/models";
import { allowAudit } from "./audit-rights";

const TRIES = 5;

/** How far the database's clock is from the app's right now; of five tries the quickest counts, its way there and back taken off. */
export async function clockNow(actor: Actor): Promise<ClockReading & { measuredAt: string }> {
  allowAudit(actor);
  const tries = [];
  for (let i = 0; i < TRIES; i += 1) {
    const [begun, sent] = [performance.now(), Date.now()];
    const [{ now }] = await connection().query<{ now: string }>("SELECT DATE_FORMAT(UTC_TIMESTAMP(6), '%Y-%m-%dT%H:%i:%s.%fZ') AS now", { type: QueryTypes.SELECT });
    // the way back by a clock that nobody sets, so that a step in between does not look like a long way
    tries.push({ sent, said: Date.parse(now), got: sent + (performance.now() - begun) });
  }
  return { ...clockOffset(tries)!, measuredAt: new Date().toISOString() };
}
