import { readFileSync } from "node:fs";
import path from "node:path";
import { Transaction } from "sequelize";
import { env } from "@/lib/env";
import { connection } from "@/models";
import { checkChains } from "./check/chains";
import { checkApprovals, checkImages, checkReads, countUnknownFiles, storedImages } from "./check/images";
import { findPlaces } from "./check/places";
import { exitCode, page, type StoreReport } from "./check/report";
import { CommandRefusal, reasonOf } from "./commands/run-command";

// `npm run check:store [-- --json]`: every log, every signature, every stored image. It reports and never repairs.
// Exit 0 clean, 1 damage found, 2 could not check.
const json = process.argv.includes("--json");

async function check(): Promise<StoreReport> {
  const notChecked: string[] = [];
  const keyInFolder = read(path.join(env().dataDir, "keys", "log-key.pub.pem"), notChecked);
  // one look at the database: what is being written meanwhile is either wholly in it or not at all
  const look = await connection().transaction({ isolationLevel: Transaction.ISOLATION_LEVELS.REPEATABLE_READ }, async (tx) => {
    const places = await findPlaces(tx);
    const chains = await checkChains(tx, places, keyInFolder);
    const images = await storedImages(tx);
    return { places, chains, images, approvals: await checkApprovals(tx, places, chains.logged) };
  });
  const images = await checkImages(look.images, look.places, ticker(look.images.length));
  const damage = [...look.chains.damage, ...checkReads(look.images, look.places, look.chains.logged), ...look.approvals, ...images.damage];
  return {
    checkedAt: new Date().toISOString(), clean: damage.length === 0 && notChecked.length === 0, chains: look.chains.chains, signatures: look.chains.signatures,
    keys: look.chains.keys, images: images.counts, reads: look.places.reads.length, damage, notChecked, unknownFiles: await countUnknownFiles(look.images),
  };
}

function read(file: string, notChecked: string[]): string | null {
  try {
    return readFileSync(file, "utf8");
  } catch (error) {
    notChecked.push(`whether the log's keys are the data folder's: ${(error as Error).message}.`);
    return null;
  }
}

/** Progress for whoever watches, on standard error so that the report stays clean. */
function ticker(total: number): (done: number) => void {
  let last = Date.now();
  return (done) => {
    if (Date.now() - last < 2000) return;
    last = Date.now();
    process.stderr.write(`Checked ${done} of ${total} images\n`);
  };
}

try {
  const unknown = process.argv.slice(2).filter((word) => word !== "--json");
  if (unknown.length > 0) throw new CommandRefusal(`This command knows --json only, not ${unknown.join(" ")}.`);
  const report = await check();
  console.log(json ? JSON.stringify(report, null, 2) : page(report));
  process.exitCode = exitCode(report);
} catch (error) {
  const why = reasonOf(error) ?? (error as Error).message;
  if (json) console.log(JSON.stringify({ clean: false, notChecked: [why] }, null, 2));
  console.error(`Could not check: ${why}`);
  process.exitCode = 2;
} finally {
  await connection().close();
}
