import { QueryTypes } from "sequelize";
import { connection } from "./connection";

const WANTED: Record<string, string[]> = {
  innodb_flush_log_at_trx_commit: ["1"],
  innodb_doublewrite: ["ON", "1", "DETECT_AND_RECOVER"],
};

/**
 * The app runs only where a commit survives a power cut and where its own user cannot touch the log's past. It reads
 * its rights and tries one UPDATE and one DELETE that would change nothing; it never tries TRUNCATE or DROP.
 */
export async function checkDatabase(): Promise<void> {
  const db = connection();
  for (const [name, values] of Object.entries(WANTED)) {
    const [row] = await db.query<{ value: string }>("SELECT VARIABLE_VALUE AS value FROM information_schema.GLOBAL_VARIABLES WHERE VARIABLE_NAME = ?", { replacements: [name], type: QueryTypes.SELECT });
    if (!row || !values.includes(String(row.value).toUpperCase())) throw new Error(`the database runs with ${name}=${row?.value ?? "unknown"}; set it to ${values[0]}, or a power cut may lose what was acknowledged.`);
  }
  const grants = await db.query<Record<string, string>>("SHOW GRANTS", { type: QueryTypes.SELECT });
  for (const grant of grants.map((row) => Object.values(row)[0])) {
    const broad = /^GRANT (?!USAGE).* ON (\*|`[^`]+`)\.\* /.test(grant);
    if (broad) throw new Error("the app's database user has rights on a whole database. Give it only what npm start gives: table by table.");
  }
  for (const statement of ["UPDATE custody_entries SET seq = seq WHERE 1 = 0", "DELETE FROM custody_entries WHERE 1 = 0"]) {
    const refused = await db.query(statement).then(() => false, () => true);
    if (!refused) throw new Error("the app's database user may change the custody log. Take UPDATE and DELETE on custody_entries away from it.");
  }
}
