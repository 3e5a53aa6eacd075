import { rmSync } from "node:fs";
import { env } from "@/lib/env";
import { asAdmin, withoutTriggers } from "./tamper";

const KEPT = new Set(["policies", "schema_migrations", "case_counters"]);

/**
 * An empty workshop in the tests' database: other tests leave logs damaged on purpose, and a look at the whole store
 * would find them. Files of images stay: they are clutter without rows.
 */
export async function emptyHouse(): Promise<void> {
  await withoutTriggers(["custody_entries", "custody_heads", "seals"], async (db) => {
    const tables = await db.query<{ name: string }[]>("SELECT TABLE_NAME AS name FROM information_schema.TABLES WHERE TABLE_SCHEMA = DATABASE()");
    await db.query("SET foreign_key_checks = 0");
    for (const { name } of tables) if (!KEPT.has(name)) await db.query(`DELETE FROM \`${name}\``);
  });
  await asAdmin((db) => db.query("UPDATE policies SET policy_reads = 3, seatings = 2, read_backs = 2, read_back_seatings = 2, two_person_rule = TRUE, second_factor = FALSE, share_days = 90, erasure_days = 90"));
  rmSync(env().witnessFile, { force: true });
}
