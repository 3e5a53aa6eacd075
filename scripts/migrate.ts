import path from "node:path";
import * as mariadb from "mariadb";
import { QueryTypes, Sequelize } from "sequelize";
import { SequelizeStorage, Umzug } from "umzug";
import { GRANTS } from "@/models/grants";
import { rightsChanges, type Right } from "./start/rights";

// Brings the tables up to date as the migrating user, then gives the app's user its rights table by table.
const { DATABASE_URL, DATABASE_ADMIN_URL } = process.env;
if (!DATABASE_URL || !DATABASE_ADMIN_URL) throw new Error("DATABASE_URL and DATABASE_ADMIN_URL are needed here. Run it as: node scripts/run.mjs scripts/migrate.ts");

const sequelize = new Sequelize(DATABASE_ADMIN_URL, {
  dialect: "mariadb", dialectModule: mariadb, logging: false, timezone: "+00:00",
  // one connection that stays: the lock below belongs to it
  pool: { max: 1, min: 1, idle: 3_600_000 },
});

const select = <Row extends object>(sql: string, replacements: string[] = []) =>
  sequelize.query<Row>(sql, { replacements, type: QueryTypes.SELECT });

async function migrate(): Promise<void> {
  const umzug = new Umzug({
    migrations: { glob: ["migrations/*.ts", { cwd: path.resolve(import.meta.dirname, "..") }] },
    context: sequelize.getQueryInterface(),
    storage: new SequelizeStorage({ sequelize, tableName: "schema_migrations" }),
    logger: undefined,
  });
  for (const done of await umzug.up()) console.log(`migrated: ${done.name}`);
}

/** The app's user as the server knows it, and the rights on tables that it has now. */
async function asApp(): Promise<{ account: string; rights: Right[] }> {
  const { hostname, port, username, password } = new URL(DATABASE_URL ?? "");
  const database = sequelize.getDatabaseName();
  const connection = await mariadb.createConnection({
    host: hostname, port: port ? Number(port) : 3306, user: decodeURIComponent(username), password: decodeURIComponent(password),
  });
  try {
    const [{ account }] = await connection.query<{ account: string }[]>("SELECT CURRENT_USER() AS account");
    const rights = await connection.query<Right[]>(
      `SELECT TABLE_NAME AS \`table\`, PRIVILEGE_TYPE AS \`right\`, NULL AS \`column\` FROM information_schema.TABLE_PRIVILEGES WHERE TABLE_SCHEMA = ?
       UNION ALL SELECT TABLE_NAME, PRIVILEGE_TYPE, COLUMN_NAME FROM information_schema.COLUMN_PRIVILEGES WHERE TABLE_SCHEMA = ?`,
      [database, database],
    );
    return { account, rights };
  } finally {
    await connection.end();
  }
}

async function grant(): Promise<void> {
  const tables = new Set((await select<{ name: string }>("SELECT TABLE_NAME AS name FROM information_schema.TABLES WHERE TABLE_SCHEMA = DATABASE()")).map((row) => row.name));
  const absent = GRANTS.filter(({ table }) => !tables.has(table)).map(({ table }) => table);
  if (absent.length > 0) throw new Error(`models/grants.ts names tables that no migration makes: ${absent.join(", ")}`);
  const { account, rights } = await asApp();
  const at = account.lastIndexOf("@");
  const user = `${sequelize.escape(account.slice(0, at))}@${sequelize.escape(account.slice(at + 1))}`;
  for (const change of rightsChanges(GRANTS, rights)) {
    const word = change.kind === "grant" ? "TO" : "FROM";
    await sequelize.query(`${change.kind === "grant" ? "GRANT" : "REVOKE"} ${change.what} ON \`${change.table}\` ${word} ${user}`);
  }
}

try {
  const [{ got }] = await select<{ got: number }>("SELECT GET_LOCK('twinread-migrate', 60) AS got");
  if (Number(got) !== 1) throw new Error("Another process is migrating this database. Wait until it is done, then start again.");
  await migrate();
  await grant();
} catch (error) {
  // the message alone: the error objects below it hold the connection's settings, with the password
  const { message, migration } = error as Error & { migration?: { name: string } };
  const cause = (error as { cause?: { message?: string } }).cause?.message;
  console.error(migration ? `${migration.name}: ${cause ?? message}` : message);
  process.exitCode = 1;
} finally {
  await sequelize.close();
}
