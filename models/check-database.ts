import { QueryTypes } from "sequelize";
import { connection } from "./connection";

const WANTED: Record<string, string[]> = {
  innodb_flush_log_at_trx_commit: ["1"],
  innodb_doublewrite: ["ON", "1", "DETECT_AND_RECOVER"],
};

/** Rows are only ever added to these. */
const LOG_TABLES = ["custody_entries", "seals"];

/** What holds a digest, a signature or the id that a chain goes by; compared as bytes or not at all. */
const EXACT_COLUMNS: Record<string, string[]> = {
  custody_entries: ["chain_id", "body", "hash", "prev", "key_id", "signature", "action"],
  custody_heads: ["chain_id", "hash"],
  seals: ["text", "sha256", "prev", "key_id", "signature", "leaves"],
  images: ["sha256"], reads: ["sha256", "source_sha256"], approvals: ["sha256"], comparisons: ["sha256_a", "sha256_b"],
};
const BYTES = /^(binary|varbinary|tinyblob|blob|mediumblob|longblob)$/;

const select = <Row extends object>(sql: string, replacements: unknown[] = []) => connection().query<Row>(sql, { replacements, type: QueryTypes.SELECT });

/**
 * The app runs only where a commit survives a power cut and where its own user cannot touch the log's past. It reads
 * its rights and how the tables are made, and tries UPDATEs and DELETEs that would change nothing; it never tries
 * TRUNCATE or DROP.
 */
export async function checkDatabase(): Promise<void> {
  await checkSettings();
  await checkRights();
  await checkVersioning();
  await checkCascades();
  await checkColumns();
}

async function checkSettings(): Promise<void> {
  for (const [name, values] of Object.entries(WANTED)) {
    const [row] = await select<{ value: string }>("SELECT VARIABLE_VALUE AS value FROM information_schema.GLOBAL_VARIABLES WHERE VARIABLE_NAME = ?", [name]);
    if (!row || !values.includes(String(row.value).toUpperCase())) throw new Error(`the database runs with ${name}=${row?.value ?? "unknown"}; set it to ${values[0]}, or a power cut may lose what was acknowledged.`);
  }
}

async function checkRights(): Promise<void> {
  for (const grant of (await select<Record<string, string>>("SHOW GRANTS")).map((row) => Object.values(row)[0])) {
    const broad = /^GRANT (?!USAGE).* ON (\*|`[^`]+`)\.\* /.test(grant);
    if (broad) throw new Error("the app's database user has rights on a whole database. Give it only what npm start gives: table by table.");
  }
  for (const table of LOG_TABLES) {
    const column = table === "seals" ? "number" : "seq";
    for (const statement of [`UPDATE ${table} SET ${column} = ${column} WHERE 1 = 0`, `DELETE FROM ${table} WHERE 1 = 0`]) {
      const refused = await connection().query(statement).then(() => false, () => true);
      if (!refused) throw new Error(`the app's database user may change ${table === "seals" ? "the seals" : "the custody log"}. Take UPDATE and DELETE on ${table} away from it.`);
    }
  }
}

/** Versioned tables refuse to be emptied in one stroke, and keep what was changed. */
async function checkVersioning(): Promise<void> {
  const rows = await select<{ name: string; type: string }>("SELECT TABLE_NAME AS name, TABLE_TYPE AS type FROM information_schema.TABLES WHERE TABLE_SCHEMA = DATABASE() AND TABLE_NAME IN (?)", [LOG_TABLES]);
  for (const table of LOG_TABLES) {
    const type = rows.find((row) => row.name === table)?.type;
    if (type !== "SYSTEM VERSIONED") throw new Error(`the table ${table} ${type === undefined ? "is not there" : "is not system-versioned: it was made anew or changed"}. Have an auditor check the log with npm run check:store, then put the table back from your backup.`);
  }
}

const CASCADES = /ON (?:DELETE|UPDATE) (?:CASCADE|SET NULL|SET DEFAULT)/i;

/** A row of another table that goes must never take one of the log with it; the lists of keys leave out what the app's user may not change. */
async function checkCascades(): Promise<void> {
  const log = [...LOG_TABLES, "custody_heads"];
  for (const { name } of await select<{ name: string }>("SELECT TABLE_NAME AS name FROM information_schema.TABLES WHERE TABLE_SCHEMA = DATABASE()")) {
    const [made] = await select<Record<string, string>>(`SHOW CREATE TABLE \`${name}\``);
    for (const line of (made["Create Table"] ?? "").split("\n")) {
      const to = /FOREIGN KEY .* REFERENCES `([^`]+)`/.exec(line)?.[1];
      const touched = to !== undefined && (log.includes(name) ? name : log.includes(to) ? to : null);
      if (touched && CASCADES.test(line)) throw new Error(`a foreign key cascades to or from ${touched}: rows of the log could change with others. Take the key away; no migration of Twinread makes one.`);
    }
  }
}

/** Under another collation two different digests could count as equal. */
async function checkColumns(): Promise<void> {
  const rows = await select<{ table: string; column: string; type: string; collation: string | null }>(
    "SELECT TABLE_NAME AS `table`, COLUMN_NAME AS `column`, DATA_TYPE AS type, COLLATION_NAME AS collation FROM information_schema.COLUMNS WHERE TABLE_SCHEMA = DATABASE() AND TABLE_NAME IN (?)", [Object.keys(EXACT_COLUMNS)],
  );
  for (const [table, columns] of Object.entries(EXACT_COLUMNS)) {
    for (const column of columns) {
      const found = rows.find((row) => row.table === table && row.column === column);
      if (!found) throw new Error(`the column ${table}.${column} is not there. Bring the tables up to date with npm start.`);
      if (!BYTES.test(found.type) && !found.collation?.endsWith("_bin")) throw new Error(`the column ${table}.${column} is compared as ${found.collation ?? found.type}, not byte for byte: two digests could count as equal. Put it back as the migrations make it.`);
    }
  }
}
