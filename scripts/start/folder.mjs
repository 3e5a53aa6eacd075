import { generateKeyPairSync, randomBytes } from "node:crypto";
import { chmodSync, closeSync, existsSync, fsyncSync, linkSync, mkdirSync, openSync, readFileSync, readdirSync, rmSync, statSync, writeSync } from "node:fs";
import path from "node:path";
import { Refusal } from "./say.mjs";

const OTHER = {
  demo: "It holds demo data. For real work set TWINREAD_DATA to another folder, or leave it out.",
  live: "It holds real work, which the demo must not touch. Set DEMO=0 to work with it, or TWINREAD_DATA to another folder.",
  test: "It belongs to the tests and is wiped by each run. Set TWINREAD_DATA to another folder.",
};

/** Makes or checks the data folder: mode 0700, and a marker so that demo data and real work never mix. */
export function prepareFolder(dataDir, kind) {
  mkdirSync(dataDir, { recursive: true, mode: 0o700 });
  const marker = path.join(dataDir, "kind");
  if (existsSync(marker)) {
    const found = readFileSync(marker, "utf8").trim();
    if (found !== kind) throw new Refusal(`${dataDir} cannot be used here. ${OTHER[found] ?? "Its file kind holds an unknown word."}`);
  } else if (readdirSync(dataDir).some((name) => !name.startsWith("lock"))) {
    throw new Refusal(`${dataDir} is not empty and was not made by Twinread. Set TWINREAD_DATA to an empty or new folder.`);
  } else {
    writeOnce(marker, `${kind}\n`);
  }
  chmodSync(dataDir, 0o700);
  for (const name of ["logs", "run", "secrets", "keys"]) mkdirSync(path.join(dataDir, name), { recursive: true, mode: 0o700 });
  makeSecrets(dataDir);
}

/** Removes what is in the folder, but for the names to keep. */
export function emptyFolder(dataDir, kept) {
  for (const name of readdirSync(dataDir)) {
    if (!kept.includes(name)) rmSync(path.join(dataDir, name), { recursive: true, force: true });
  }
}

/** Secrets and keys, each made once and never replaced. */
export function makeSecrets(dataDir) {
  const secret = (name, make) => writeOnce(path.join(dataDir, "secrets", name), make);
  secret("session-secret", () => `${randomBytes(32).toString("base64url")}\n`);
  secret("db-app-password", () => `${randomBytes(32).toString("base64url")}\n`);
  secret("db-admin-password", () => `${randomBytes(32).toString("base64url")}\n`);
  secret("outbox-key", () => `${randomBytes(32).toString("hex")}\n`);
  for (const use of ["log", "seal"]) makeKey(dataDir, use);
}

/** The key that signs the log, and the one that signs seals: an older version's folder gets the second at its next start. */
function makeKey(dataDir, use) {
  const keyFile = path.join(dataDir, `keys/${use}-key.pem`);
  const publicFile = path.join(dataDir, `keys/${use}-key.pub.pem`);
  if (existsSync(keyFile) && existsSync(publicFile)) return checkMode(keyFile);
  if (existsSync(keyFile)) throw new Refusal(`${publicFile} is missing beside the ${use} key. Bring the folder keys back from your backup.`);
  const pair = generateKeyPairSync("ed25519");
  // the public half first: a start that is cut in between leaves no key without it
  rmSync(publicFile, { force: true });
  writeOnce(publicFile, pair.publicKey.export({ type: "spki", format: "pem" }));
  writeOnce(keyFile, pair.privateKey.export({ type: "pkcs8", format: "pem" }));
}

export function readSecretFile(dataDir, name) {
  const file = path.join(dataDir, "secrets", name);
  checkMode(file);
  return readFileSync(file, "utf8").trim();
}

function checkMode(file) {
  if ((statSync(file).mode & 0o077) === 0) return;
  throw new Refusal(`${file} can be read by others. Set its mode to 0600 (chmod 600); if somebody may have copied it, replace it.`);
}

/** The whole file, mode 0600, on disk before it gets its name; an existing one stays. */
function writeOnce(file, content) {
  if (existsSync(file)) return checkMode(file);
  const draft = `${file}.${process.pid}`;
  const handle = openSync(draft, "wx", 0o600);
  writeSync(handle, typeof content === "function" ? content() : content);
  fsyncSync(handle);
  closeSync(handle);
  linkSync(draft, file);
  rmSync(draft);
  const folder = openSync(path.dirname(file), "r");
  fsyncSync(folder);
  closeSync(folder);
}
