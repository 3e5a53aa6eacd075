import { type Sequelize, Transaction } from "sequelize";
import { connection } from "@/models";
import { checkDatabase } from "@/models/check-database";
import { checkAgainst } from "@/scripts/check/against";
import { checkImages } from "@/scripts/check/images";
import type { Damage } from "@/scripts/check/report";
import { lookAtDatabase } from "@/scripts/check/store";
import { checkWitness } from "@/scripts/check/witness";
import type { Sql } from "./scene";

/** By what an attack is noticed, strongest first as the page counts them. */
export const LAYERS = ["refused", "chain", "signature", "seal", "record", "image", "start", "witness", "outside"] as const;
export type Layer = (typeof LAYERS)[number];

export interface Outcome {
  layers: Layer[];
  /** the first things found, for whoever reads the page */
  first: string;
  ms: number;
}

export interface LookOptions {
  /** PEM */
  keyInFolder: string;
  outside: readonly string[];
  noWitness: boolean;
}

const SIGNATURE = new Set(["signature", "unknown-key", "old-key", "key"]);

export function layerOf({ problem }: Pick<Damage, "problem">): Layer {
  if (SIGNATURE.has(problem)) return "signature";
  if (problem === "witness") return "witness";
  if (problem.startsWith("outside")) return "outside";
  if (problem.startsWith("seal")) return "seal";
  if (problem.startsWith("image-") && problem !== "image-record") return "image";
  return /-(in|from)-log$|-missing$|image-record/.test(problem) && problem !== "tail-missing" ? "record" : "chain";
}

/** What the whole check says of the database as this transaction sees it. */
export async function look(tx: Transaction, { keyInFolder, outside, noWitness }: LookOptions): Promise<Outcome> {
  const began = performance.now();
  const seen = await lookAtDatabase(tx, keyInFolder);
  const images = await checkImages(seen.images, seen.places, () => {});
  const witness = noWitness ? { damage: [] } : await checkWitness(seen.here);
  const copies = await checkAgainst(outside, seen.here);
  const damage = [...seen.damage, ...images.damage, ...witness.damage, ...copies.damage];
  const found = new Set(damage.map(layerOf));
  return {
    layers: LAYERS.filter((layer) => found.has(layer)), ms: performance.now() - began,
    first: damage.slice(0, 2).map(({ place, seq, problem }) => `${place}${seq === null ? "" : `, entry ${seq}`}: ${problem}`).join("; "),
  };
}

/** Does something within a transaction, looks, and takes all of it back. */
export async function tried(work: (db: Sql) => Promise<void>, options: LookOptions): Promise<Outcome> {
  const tx = await connection().transaction({ isolationLevel: Transaction.ISOLATION_LEVELS.REPEATABLE_READ });
  try {
    await work(sqlOf(tx));
    return await look(tx, options);
  } finally {
    await tx.rollback();
  }
}

/** The connection itself, for statements with values as MariaDB's own program sends them. */
export function sqlOf(tx: Transaction): Sql {
  return (tx as unknown as { connection: Sql }).connection;
}

/** The sentence with which the database refuses; null when it does not. All is taken back. */
export async function refusalOf(db: Sql, work: (db: Sql) => Promise<void>): Promise<string | null> {
  await db.query("START TRANSACTION");
  try {
    await work(db);
    return null;
  } catch (error) {
    return (error as Error).message.replace(/\s+sql:[\s\S]*$/, "").replace(/^\(conn:[^)]*\) /, "");
  } finally {
    await db.query("ROLLBACK");
  }
}

const shared = globalThis as unknown as { twinreadSequelize?: Sequelize };

/** Whether the app would start on the tables as they are: asked with its own account, whatever this process runs as. */
export async function startsUp(appUrl: string): Promise<boolean> {
  const [pool, url] = [shared.twinreadSequelize, process.env.DATABASE_URL];
  shared.twinreadSequelize = undefined;
  process.env.DATABASE_URL = appUrl;
  try {
    return await checkDatabase().then(() => true, () => false);
  } finally {
    await connection().close();
    shared.twinreadSequelize = pool;
    process.env.DATABASE_URL = url;
  }
}
