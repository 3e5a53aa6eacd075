import { createHash, createPrivateKey, createPublicKey, generateKeyPairSync, type KeyObject, sign, verify } from "node:crypto";
import { closeSync, existsSync, fsyncSync, mkdirSync, openSync, readFileSync, renameSync, rmSync, statSync, writeSync } from "node:fs";
import path from "node:path";
import { env } from "@/lib/env";

export type KeyUse = "log" | "seal";

/** One of the app's Ed25519 keys (RFC 8032): a file of mode 0600 beside, never inside, the database. */
export interface SigningKey {
  /** SHA-256 of the public key's SPKI DER, lower-case hex */
  keyId: string;
  publicKeyPem: string;
  sign(bytes: Uint8Array): Buffer;
}

// One set of keys a process: the bundler may load this module more than once, and all must change over together.
const shared = globalThis as unknown as { twinreadKeys?: Map<string, SigningKey> };
const loaded = () => (shared.twinreadKeys ??= new Map());

const folder = () => path.join(env().dataDir, "keys");
const fileOf = (use: KeyUse) => path.join(folder(), `${use}-key.pem`);
const publicFileOf = (use: KeyUse) => path.join(folder(), `${use}-key.pub.pem`);
const oldFileOf = (keyId: string) => path.join(folder(), "old", `${keyId}.pub.pem`);
const nextFileOf = (use: KeyUse) => path.join(folder(), `${use}-key.next.pem`);

export const logKey = () => keyInUse("log");
export const sealKey = () => keyInUse("seal");

function keyInUse(use: KeyUse): SigningKey {
  const file = fileOf(use);
  let key = loaded().get(file);
  // another process of this data folder may have changed it: its public half then lies among the old ones
  if (!key || existsSync(oldFileOf(key.keyId))) loaded().set(file, (key = load(file)));
  return key;
}

function load(file: string): SigningKey {
  if ((statSync(file).mode & 0o077) !== 0) {
    throw new Error(`${file} can be read by others. Set its mode to 0600; if somebody may have copied it, change the key.`);
  }
  const secret = createPrivateKey(readFileSync(file));
  const open = createPublicKey(secret);
  return { keyId: keyIdOf(open), publicKeyPem: pemOf(open), sign: (bytes) => sign(null, bytes, secret) };
}

const pemOf = (key: KeyObject) => key.export({ type: "spki", format: "pem" }) as string;

/**
 * Writes a new key beside the one in use, on disk before this returns; nothing is signed with it yet. Throws where a
 * change is under way already.
 */
export function makeNextKey(use: KeyUse): { keyId: string; publicKeyPem: string } {
  const { publicKey, privateKey } = generateKeyPairSync("ed25519");
  write(nextFileOf(use), privateKey.export({ type: "pkcs8", format: "pem" }) as string, "wx");
  return { keyId: keyIdOf(publicKey), publicKeyPem: pemOf(publicKey) };
}

/** The id of the key that waits to come into use; null when none does. */
export function nextKeyId(use: KeyUse): string | null {
  const file = nextFileOf(use);
  if (!statSync(file, { throwIfNoEntry: false })) return null;
  try {
    return keyIdOf(createPublicKey(createPrivateKey(readFileSync(file))));
  } catch {
    // its writer died before the last byte: nothing can have introduced it
    return "";
  }
}

export function dropNextKey(use: KeyUse): void {
  rmSync(nextFileOf(use), { force: true });
  syncFolder(folder());
}

/**
 * Brings the waiting key into use when it is the one of this id: the former public half is kept under `keys/old`, the
 * former private half is gone. Each step can be done again after a crash. False when another key waits, or none.
 */
export function placeNextKey(use: KeyUse, keyId: string): boolean {
  if (keyId === "" || nextKeyId(use) !== keyId) return false;
  const former = load(fileOf(use));
  const next = load(nextFileOf(use));
  if (former.keyId !== keyId) {
    mkdirSync(path.dirname(oldFileOf(former.keyId)), { recursive: true, mode: 0o700 });
    replace(oldFileOf(former.keyId), former.publicKeyPem);
  }
  replace(publicFileOf(use), next.publicKeyPem);
  renameSync(nextFileOf(use), fileOf(use));
  syncFolder(folder());
  loaded().delete(fileOf(use));
  return true;
}

function write(file: string, content: string, flags: "w" | "wx"): void {
  const handle = openSync(file, flags, 0o600);
  try {
    writeSync(handle, content);
    fsyncSync(handle);
  } finally {
    closeSync(handle);
  }
  syncFolder(path.dirname(file));
}

/** Either the former file or the whole new one, never half of it. */
function replace(file: string, content: string): void {
  write(`${file}.${process.pid}`, content, "w");
  renameSync(`${file}.${process.pid}`, file);
  syncFolder(path.dirname(file));
}

function syncFolder(dir: string): void {
  const handle = openSync(dir, "r");
  try {
    fsyncSync(handle);
  } finally {
    closeSync(handle);
  }
}

export function keyIdOf(key: KeyObject): string {
  return createHash("sha256").update(key.export({ type: "spki", format: "der" })).digest("hex");
}

/** Ed25519 over the bytes with a public key in PEM; false for anything that does not hold. */
export function verifySignature(publicKeyPem: string, bytes: Uint8Array, signature: Uint8Array): boolean {
  try {
    return verify(null, bytes, createPublicKey(publicKeyPem), signature);
  } catch {
    return false;
  }
}
