import { readFileSync } from "node:fs";
import path from "node:path";
import { Transaction } from "sequelize";
import { env } from "@/lib/env";
import { connection } from "@/models";
import { checkAgainst } from "./against";
import { checkChains } from "./chains";
import { checkErasures } from "./erasures";
import { checkImages, checkReads, countUnknownFiles, type StoredImage, storedImages } from "./images";
import { findPlaces, type Places } from "./places";
import { checkRecord } from "./record";
import { checkAround } from "./record-around";
import { checkThings } from "./record-places";
import type { Damage, StoreReport } from "./report";
import { sealRows } from "./seal-rows";
import { checkSeals } from "./seals";
import { checkWitness } from "./witness";
import type { Here } from "./against-bundle";

export interface Looked {
  report: Pick<StoreReport, "chains" | "signatures" | "keys" | "seals" | "reads">;
  damage: Damage[];
  places: Places;
  images: StoredImage[];
  here: Here;
}

/** Everything that lies in the database, in one look: logs, seals, and the rows that the logs tell of. `keyInFolder` is the log's public key in PEM. */
export async function lookAtDatabase(tx: Transaction, keyInFolder: string | null): Promise<Looked> {
  const places = await findPlaces(tx);
  const { ledger, logged, damage, ...report } = await checkChains(tx, places, keyInFolder);
  const { seals, known, damage: atSeals } = await checkSeals(sealRows(tx), ledger);
  const images = await storedImages(tx);
  return {
    report: { ...report, seals, reads: places.reads.length }, places, images,
    damage: [...damage, ...atSeals, ...checkReads(images, places, logged), ...(await checkRecord(tx, places, logged)), ...(await checkThings(tx, places, logged)), ...(await checkAround(tx, places, logged)), ...(await checkErasures(tx, images, places, logged))],
    here: { ledger, known, images: new Set(images.map((image) => image.sha256)) },
  };
}

/** The whole check. It reports and never repairs. */
export async function checkStore(against: readonly string[] = [], tick: (done: number, total: number) => void = () => {}): Promise<StoreReport> {
  const notChecked: string[] = [];
  const keyInFolder = readKey(path.join(env().dataDir, "keys", "log-key.pub.pem"), notChecked);
  // one look at the database: what is being written meanwhile is either wholly in it or not at all
  const look = await connection().transaction({ isolationLevel: Transaction.ISOLATION_LEVELS.REPEATABLE_READ }, (tx) => lookAtDatabase(tx, keyInFolder));
  const images = await checkImages(look.images, look.places, (done) => tick(done, look.images.length));
  const witness = await checkWitness(look.here);
  const outside = await checkAgainst(against, look.here);
  const damage = [...look.damage, ...images.damage, ...witness.damage, ...outside.damage];
  notChecked.push(...witness.notChecked, ...outside.notChecked);
  return {
    checkedAt: new Date().toISOString(), clean: damage.length === 0 && notChecked.length === 0, ...look.report, witness: witness.witness,
    images: images.counts, against: outside.against, damage, notChecked, notes: [...witness.notes, ...outside.notes], unknownFiles: await countUnknownFiles(look.images),
  };
}

function readKey(file: string, notChecked: string[]): string | null {
  try {
    return readFileSync(file, "utf8");
  } catch (error) {
    notChecked.push(`whether the log's keys are the data folder's: ${(error as Error).message}.`);
    return null;
  }
}
