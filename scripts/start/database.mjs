import { createHash } from "node:crypto";
import { existsSync, mkdirSync, renameSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { keep, lastLines, launch } from "./child.mjs";
import { readSecretFile } from "./folder.mjs";
import { once } from "./once.mjs";
import { findProgram } from "./packages.mjs";
import { checkPort } from "./ports.mjs";
import { sleep } from "./process-id.mjs";
import { progress, Refusal } from "./say.mjs";

const isRoot = process.getuid?.() === 0;
const asUser = isRoot ? ["--user=root"] : [];

export const appUrl = (dataDir, port) => `mariadb://twinread_app:${readSecretFile(dataDir, "db-app-password")}@127.0.0.1:${port}/twinread`;
export const adminUrl = (dataDir, port) => `mariadb://twinread_admin:${readSecretFile(dataDir, "db-admin-password")}@127.0.0.1:${port}/twinread`;

/** Starts the built-in MariaDB of the data folder and keeps it running. Loopback only. */
export async function keepDatabase({ dataDir, port, onGiveUp, mostRestarts, control }) {
  await checkPort("127.0.0.1", port, "DB_PORT", "the database");
  if (!existsSync(path.join(dataDir, "db"))) await progress("Making the database", () => makeDatabase(dataDir));
  return keep({
    dataDir, name: "database", label: "The database", onGiveUp, mostRestarts, control,
    start: () => progress("Starting the database", () => start(dataDir, port, control)),
  });
}

/** The server's own tables, made beside and moved into place whole. */
async function makeDatabase(dataDir) {
  const draft = path.join(dataDir, "db.new");
  rmSync(draft, { recursive: true, force: true });
  mkdirSync(draft, { mode: 0o700 });
  await once(findProgram("mariadb-install-db"), ["--no-defaults", ...asUser, `--datadir=${draft}`, "--skip-test-db"]);
  renameSync(draft, path.join(dataDir, "db"));
}

/** Unix sockets take 107 characters at most: in a deep data folder the socket moves to the temporary folder. */
function socketPath(dataDir) {
  const near = path.join(dataDir, "run/db.sock");
  if (Buffer.byteLength(near) <= 100) return near;
  return path.join(os.tmpdir(), `twinread-${createHash("sha256").update(dataDir).digest("hex").slice(0, 16)}.sock`);
}

/**
 * Run by the server before it answers on TCP. The migrating user owns the one database and nothing else; the app's user
 * starts without any right and gets them table by table. Passwords are base64url: nothing in them needs quoting.
 */
function initStatements(dataDir) {
  const user = (name, secret) => [
    `CREATE USER IF NOT EXISTS '${name}'@'127.0.0.1';`,
    `ALTER USER '${name}'@'127.0.0.1' IDENTIFIED BY '${readSecretFile(dataDir, secret)}';`,
  ];
  return [
    "CREATE DATABASE IF NOT EXISTS twinread CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci;",
    ...user("twinread_admin", "db-admin-password"),
    ...user("twinread_app", "db-app-password"),
    "GRANT ALL ON twinread.* TO 'twinread_admin'@'127.0.0.1' WITH GRANT OPTION;",
    "",
  ].join("\n");
}

async function start(dataDir, port, control) {
  const initFile = path.join(dataDir, "run/init.sql");
  rmSync(initFile, { force: true });
  writeFileSync(initFile, initStatements(dataDir), { mode: 0o600, flag: "wx" });
  const handle = launch({
    control, dataDir, name: "database", port, command: findProgram("mariadbd"), env: { PATH: process.env.PATH, LC_ALL: "C" },
    args: [
      "--no-defaults", ...asUser, `--datadir=${path.join(dataDir, "db")}`, `--socket=${socketPath(dataDir)}`,
      `--pid-file=${path.join(dataDir, "run/db.pid")}`, `--port=${port}`, "--bind-address=127.0.0.1", "--skip-name-resolve",
      // a server that starts clears this folder of temporary tables: in /tmp they may be another's, in use
      `--tmpdir=${path.join(dataDir, "run")}`,
      `--init-file=${initFile}`, "--character-set-server=utf8mb4", "--collation-server=utf8mb4_unicode_ci",
      "--default-time-zone=+00:00",
      "--sql-mode=STRICT_TRANS_TABLES,ERROR_FOR_DIVISION_BY_ZERO,NO_ENGINE_SUBSTITUTION,ONLY_FULL_GROUP_BY",
      "--innodb-flush-log-at-trx-commit=1", "--innodb-doublewrite=ON", "--skip-log-bin", "--innodb-buffer-pool-size=256M",
      "--max-allowed-packet=64M", "--local-infile=0",
    ],
  });
  try {
    await answers(handle, dataDir, port);
  } finally {
    rmSync(initFile, { force: true });
  }
  return handle;
}

/** Waits as long as the server lives: after a crash it may have to go through its log first. */
async function answers(handle, dataDir, port) {
  const { createConnection } = await import("mariadb");
  for (;;) {
    const how = handle.hasEnded();
    if (how) throw new Refusal(`${lastLines(dataDir, "database")}\nThe database ended while starting (${how}). Its last lines are above.`);
    try {
      const connection = await createConnection(`${adminUrl(dataDir, port)}?connectTimeout=1000`);
      await connection.query("SELECT 1");
      await connection.end();
      return;
    } catch {
      await sleep(100);
    }
  }
}
