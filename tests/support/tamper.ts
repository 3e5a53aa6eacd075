import { chmodSync, readFileSync, renameSync, writeFileSync } from "node:fs";
import path from "node:path";
import * as mariadb from "mariadb";

/** What an attacker with the migrating user's rights, or with a shell on the machine, could do. Everything is put back. */

export async function asAdmin<T>(run: (db: mariadb.Connection) => Promise<T>): Promise<T> {
  const url = process.env.DATABASE_ADMIN_URL;
  if (!url) throw new Error("DATABASE_ADMIN_URL is not set. Run database tests with: node scripts/test.mjs --only=<path>");
  const db = await mariadb.createConnection(url);
  try {
    return await run(db);
  } finally {
    await db.end();
  }
}

/** Runs statements with the triggers of these tables out of the way, then makes the very same triggers again. */
export function withoutTriggers<T>(tables: string[], run: (db: mariadb.Connection) => Promise<T>): Promise<T> {
  return asAdmin(async (db) => {
    const made: string[] = [];
    for (const table of tables) {
      const triggers = (await db.query(`SHOW TRIGGERS LIKE '${table}'`)) as { Trigger: string }[];
      for (const { Trigger: name } of triggers) {
        const [row] = (await db.query(`SHOW CREATE TRIGGER ${name}`)) as { "SQL Original Statement": string }[];
        made.push(row["SQL Original Statement"].replace(/ DEFINER=`[^`]*`@`[^`]*`/, ""));
        await db.query(`DROP TRIGGER ${name}`);
      }
    }
    try {
      return await run(db);
    } finally {
      for (const statement of made) await db.query(statement);
    }
  });
}

/** One byte of an entry's body, changed where the log cannot refuse it. Gives back how to undo it. */
export async function changeBody(chain: string, seq: number, change: (body: Buffer) => Buffer): Promise<() => Promise<void>> {
  const put = (body: Buffer) => withoutTriggers(["custody_entries"], (db) => db.query("UPDATE custody_entries SET body = ? WHERE chain_id = ? AND seq = ?", [body, chain, seq]));
  const [{ body: before }] = await asAdmin((db) => db.query<{ body: Buffer }[]>("SELECT body FROM custody_entries WHERE chain_id = ? AND seq = ?", [chain, seq]));
  await put(change(Buffer.from(before)));
  return async () => void (await put(before));
}

const dataFolder = () => process.env.TWINREAD_DATA ?? "";

export const imageFile = (sha256: string) => path.join(dataFolder(), "images", "sha256", sha256.slice(0, 2), sha256);

/** Flips one bit of a stored image. Gives back how to undo it. */
export function damageImage(sha256: string, at = 100): () => void {
  const file = imageFile(sha256);
  const before = readFileSync(file);
  const after = Buffer.from(before);
  after[at] ^= 1;
  chmodSync(file, 0o640);
  writeFileSync(file, after);
  return () => writeFileSync(file, before);
}

/** Takes a stored image away. Gives back how to undo it. */
export function loseImage(sha256: string): () => void {
  const file = imageFile(sha256);
  renameSync(file, `${file}-away`);
  return () => renameSync(`${file}-away`, file);
}
