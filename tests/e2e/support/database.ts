import { type Connection, createConnection } from "mariadb";

/** The database with the migrating user's rights: for ageing rows, and for what an attacker with those rights could do. */
export async function asAdmin<T>(run: (db: Connection) => Promise<T>): Promise<T> {
  const url = process.env.DATABASE_ADMIN_URL;
  if (!url) throw new Error("DATABASE_ADMIN_URL is not set. Run the browser tests with: npm test");
  const db = await createConnection(url);
  try {
    return await run(db);
  } finally {
    await db.end();
  }
}

/** Moves the times of all open sessions of a user into the past. */
export const ageSessions = (userId: string, { idleMinutes = 0, ageMinutes = 0 }: { idleMinutes?: number; ageMinutes?: number }): Promise<unknown> =>
  asAdmin((db) => db.query(
    "UPDATE sessions SET last_seen_at = last_seen_at - INTERVAL ? MINUTE, created_at = created_at - INTERVAL ? MINUTE WHERE user_id = ? AND ended_at IS NULL",
    [idleMinutes, ageMinutes, userId],
  ));

/** Minutes since the latest session of a user was last seen. */
export async function idleMinutes(userId: string): Promise<number> {
  const [{ idle }] = await asAdmin((db) => db.query<{ idle: number | bigint }[]>(
    "SELECT TIMESTAMPDIFF(MINUTE, MAX(last_seen_at), UTC_TIMESTAMP(6)) AS idle FROM sessions WHERE user_id = ?", [userId],
  ));
  return Number(idle);
}

/** Changes the body of one entry with the log's triggers out of the way, and puts the very same triggers back. */
export function rewriteBody(chain: string, seq: number, change: (body: Buffer) => Buffer): Promise<Buffer> {
  return asAdmin(async (db) => {
    const triggers = (await db.query("SHOW TRIGGERS LIKE 'custody_entries'")) as { Trigger: string }[];
    const made: string[] = [];
    for (const { Trigger: name } of triggers) {
      const [row] = (await db.query(`SHOW CREATE TRIGGER ${name}`)) as { "SQL Original Statement": string }[];
      made.push(row["SQL Original Statement"].replace(/ DEFINER=`[^`]*`@`[^`]*`/, ""));
    }
    const [{ body }] = await db.query<{ body: Buffer }[]>("SELECT body FROM custody_entries WHERE chain_id = ? AND seq = ?", [chain, seq]);
    for (const { Trigger: name } of triggers) await db.query(`DROP TRIGGER ${name}`);
    try {
      await db.query("UPDATE custody_entries SET body = ? WHERE chain_id = ? AND seq = ?", [change(Buffer.from(body)), chain, seq]);
    } finally {
      for (const statement of made) await db.query(statement);
    }
    return body;
  });
}
