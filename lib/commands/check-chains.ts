import { QueryTypes } from "sequelize";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { checkCustody } from "@/lib/queries/custody";
import { connection } from "@/models";
import { recordChainCheck } from "./record-chain-check";

export const CHAIN_CHECK_HOURS = 24;

/** Chains whose last whole check is older than a day, or that had none; the one checked longest ago first. */
async function chainsDue(): Promise<string[]> {
  const rows = await connection().query<{ chain: string }>(
    `SELECT a.chain FROM (SELECT ? AS chain UNION SELECT chain_id FROM custody_heads UNION SELECT DISTINCT chain_id FROM custody_entries UNION SELECT id FROM drives) a
     LEFT JOIN chain_checks c ON c.chain_id = a.chain
     WHERE c.checked_at IS NULL OR c.checked_at < UTC_TIMESTAMP(6) - INTERVAL ${CHAIN_CHECK_HOURS} HOUR ORDER BY c.checked_at, a.chain`,
    { replacements: [WORKSHOP_CHAIN], type: QueryTypes.SELECT },
  );
  return rows.map((row) => row.chain);
}

const breathe = () => new Promise<void>((done) => void setTimeout(done, 20).unref());

/** Checks every chain that was not checked for a day, one at a time. Answers how many were checked and how many not clean. */
export async function checkChains(): Promise<{ checked: number; notClean: number }> {
  const done = { checked: 0, notClean: 0 };
  for (const chain of await chainsDue()) {
    const check = await checkCustody(chain);
    await recordChainCheck(chain, check);
    done.checked += 1;
    if (!check.ok) done.notClean += 1;
    await breathe();
  }
  return done;
}
