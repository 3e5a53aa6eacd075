import { readFileSync } from "node:fs";
import path from "node:path";
import * as mariadb from "mariadb";
import { env } from "@/lib/env";
import { withoutTriggers } from "@/tests/support/tamper";
import type { Attacker, Cell } from "./cells";
import { type Layer, type Outcome, refusalOf, startsUp, tried } from "./run";
import { dropDump, makeScene, type Scene, type Sql } from "./scene";

export interface Result {
  cell: Pick<Cell, "attacker" | "name" | "row" | "unseen">;
  /** the database's sentence; null where it lets it happen */
  refused: string | null;
  /** what the check finds once it has happened; null where it cannot happen */
  outcome: Outcome | null;
}

/** Noticed, or said on the page to be unseen. */
export const isAsSaid = ({ cell, refused, outcome }: Result) => (outcome === null ? refused !== null : (outcome.layers.length === 0) === (cell.unseen !== undefined));

/** the layers that stop or show the attack, in their order */
export const layersOf = ({ refused, outcome }: Result): Layer[] => [...(refused !== null ? ["refused" as const] : []), ...(outcome?.layers ?? [])];

interface Accounts {
  /** address of the app's own account, whatever this process itself runs as */
  appUrl: string;
  /** of the account that migrates */
  adminUrl: string;
}

/** The connection of each account that is tried with its protections in place; the stronger ones have taken them away. */
async function withAccounts<T>({ appUrl, adminUrl }: Accounts, run: (account: Partial<Record<Attacker, Sql>>) => Promise<T>): Promise<T> {
  const [app, admin, root] = [await mariadb.createConnection(appUrl), await mariadb.createConnection(adminUrl), await asRoot(adminUrl)];
  try {
    return await run({ A1: app, A2: admin, A3: root });
  } finally {
    for (const connected of [app, admin, root]) await connected.end();
  }
}

/** The server's root over its socket; where the server does not let it in (a server of one's own), the account that migrates stands in. */
async function asRoot(adminUrl: string): Promise<mariadb.Connection> {
  const database = new URL(adminUrl).pathname.slice(1);
  return mariadb.createConnection({ socketPath: path.join(env().dataDir, "run/db.sock"), user: "root", database }).catch(() => mariadb.createConnection(adminUrl));
}

const TRIGGERED = ["custody_entries", "custody_heads", "seals"];

/** Tries every cell. First with the database's protections in place, each account by itself; then, where it could happen, without them. */
export async function runMatrix(
  cells: readonly Cell[], accounts: Accounts, folder: string, tick: (done: number) => void = () => {},
): Promise<{ results: Result[]; scene: Scene }> {
  return withAccounts(accounts, async (account) => {
    const admin = account.A2!;
    const scene = await makeScene(admin, folder);
    try {
      const refusals: (string | null)[] = [];
      for (const cell of cells) {
        const db = account[cell.attacker];
        refusals.push(db && cell.attacker !== "A6" ? await refusalOf(db, (sql) => cell.run(sql, scene)) : null);
      }
      const results = await withoutTriggers(TRIGGERED, () => afterwards(cells, refusals, scene, tick));
      return { results: [...results, ...(await atStart(account, accounts.appUrl))], scene };
    } finally {
      for (const name of ["week", "now"]) await dropDump(admin, name);
    }
  });
}

async function afterwards(cells: readonly Cell[], refusals: (string | null)[], scene: Scene, tick: (done: number) => void): Promise<Result[]> {
  const keyInFolder = readFileSync(path.join(env().dataDir, "keys/log-key.pub.pem"), "utf8");
  const clean = await tried(() => Promise.resolve(), { keyInFolder, outside: [scene.recent.mail, scene.recent.bundle, scene.recent.witness], noWitness: false });
  if (clean.layers.length > 0) throw new Error(`The check finds something before anything was done: ${clean.first}`);
  const results: Result[] = [];
  for (const [i, cell] of cells.entries()) {
    const { attacker, name, row, unseen } = cell;
    const refused = refusals[i];
    let outcome: Outcome | null = null;
    // the app's account cannot take protections away; the others can
    if (refused === null || attacker !== "A1") {
      try {
        outcome = await tried((db) => cell.run(db, scene), { keyInFolder, outside: cell.outside?.(scene) ?? [], noWitness: cell.noWitness ?? false });
      } catch (error) {
        throw new Error(`${attacker} ${name} ${row}: ${(error as Error).message}`, { cause: error });
      } finally {
        cell.undo?.();
      }
    }
    results.push({ cell: { attacker, name, row, ...(unseen === undefined ? {} : { unseen }) }, refused, outcome });
    tick(i + 1);
  }
  return results;
}

const anew = (table: string) => [`RENAME TABLE ${table} TO ${table}_away`, `CREATE TABLE ${table} LIKE ${table}_away`];
const back = (table: string) => [`DROP TABLE ${table}`, `RENAME TABLE ${table}_away TO ${table}`];

/** Changes to the tables themselves cannot be taken back by a transaction: each is undone by hand. */
const TABLES: { name: string; by: string[]; undo: string[]; empties?: string }[] = ["custody_entries", "custody_heads", "seals"].flatMap((table) => [
  { name: `truncate ${table}`, by: [`TRUNCATE TABLE ${table}`], undo: [], empties: table },
  { name: `drop ${table} and make it anew, empty`, by: anew(table), undo: back(table) },
  ...(table === "custody_heads" ? [] : [{ name: `take the versions of ${table} away`, by: [`ALTER TABLE ${table} DROP SYSTEM VERSIONING`], undo: [`ALTER TABLE ${table} ADD SYSTEM VERSIONING`] }]),
  { name: `compare ${table === "seals" ? "key_id" : "chain_id"} of ${table} without capitals`, by: [`ALTER TABLE ${table} MODIFY ${table === "seals" ? "key_id CHAR(64)" : "chain_id CHAR(36)"} CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL`], undo: [`ALTER TABLE ${table} MODIFY ${table === "seals" ? "key_id CHAR(64)" : "chain_id CHAR(36)"} CHARACTER SET ascii COLLATE ascii_bin NOT NULL`] },
]);

async function atStart(account: Partial<Record<Attacker, Sql>>, appUrl: string): Promise<Result[]> {
  if (!(await startsUp(appUrl))) throw new Error("The app would not start before anything was done.");
  const results: Result[] = [];
  const keyInFolder = readFileSync(path.join(env().dataDir, "keys/log-key.pub.pem"), "utf8");
  for (const attacker of ["A1", "A2", "A3"] as const) {
    const db = account[attacker]!;
    for (const { name, by, undo, empties } of TABLES) {
      const cell = { attacker, name, row: "" };
      // what could not be undone is tried on an empty copy made the same way; what it leaves is then put in the real one's place
      const target = empties ? by.map((statement) => statement.replace(empties, attacker === "A1" ? empties : `${empties}_copy`)) : by;
      if (empties && attacker !== "A1") await account.A2!.query(`CREATE TABLE ${empties}_copy LIKE ${empties}`);
      let refused: string | null = null;
      await db.query("SET system_versioning_alter_history = 1");
      let outcome: Outcome | null = null;
      try {
        for (const statement of target) await db.query(statement);
        if (empties) for (const statement of anew(empties)) await account.A2!.query(statement);
        const seen = await tried(() => Promise.resolve(), { keyInFolder, outside: [], noWitness: false });
        outcome = { ...seen, layers: [...seen.layers.filter((layer) => layer !== "witness"), ...((await startsUp(appUrl)) ? [] : ["start" as const]), ...seen.layers.filter((layer) => layer === "witness")] };
      } catch (error) {
        refused = (error as Error).message.replace(/\s+sql:[\s\S]*$/, "").replace(/^\(conn:[^)]*\) /, "");
      }
      if (refused === null) for (const statement of empties ? back(empties) : undo) await account.A2!.query(statement);
      if (empties && attacker !== "A1") await account.A2!.query(`DROP TABLE ${empties}_copy`);
      results.push({ cell, refused, outcome });
    }
  }
  return results;
}
