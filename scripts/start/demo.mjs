import { existsSync, readFileSync, writeFileSync } from "node:fs";
import path from "node:path";
import { emptyFolder } from "./folder.mjs";
import { once } from "./once.mjs";
import { appVariables, isEmbedded, tsArgs } from "./settings.mjs";
import { progress, root, say } from "./say.mjs";

const SCRIPT = "scripts/seed-demo.ts";
const KEPT = ["kind", "lock", "secrets", "keys", "run", "logs"];
const markOf = (dataDir) => path.join(dataDir, "demo-data");

/** A demo whose making was cut short holds half a workshop that nobody has worked in yet: it is made afresh. */
export function clearHalfMadeDemo(settings) {
  const mark = markOf(settings.dataDir);
  if (!isEmbedded(settings) || !existsSync(mark) || readFileSync(mark, "utf8").trim() !== "started") return;
  say("The demo data was being made when Twinread was stopped. Making it afresh.");
  emptyFolder(settings.dataDir, KEPT);
}

/** Fills an empty database with the demo workshop. */
export async function seedDemo(settings) {
  if (!settings.demo || !existsSync(path.join(root, SCRIPT)) || !(await isEmpty(settings))) return;
  writeFileSync(markOf(settings.dataDir), "started\n", { mode: 0o600 });
  await progress("Making the demo data", () => once(process.execPath, tsArgs(SCRIPT), { env: appVariables(settings) }));
  writeFileSync(markOf(settings.dataDir), "done\n", { mode: 0o600 });
}

async function isEmpty(settings) {
  const { createConnection } = await import("mariadb");
  const connection = await createConnection(appVariables(settings).DATABASE_URL);
  try {
    return (await connection.query("SELECT 1 FROM users LIMIT 1")).length === 0;
  } finally {
    await connection.end();
  }
}

/** The demo accounts with their first passwords, as kept in the data folder; empty when there are none. */
export function demoAccounts(dataDir) {
  const file = path.join(dataDir, "first-sign-in.txt");
  return existsSync(file) ? readFileSync(file, "utf8").trimEnd().split("\n") : [];
}
