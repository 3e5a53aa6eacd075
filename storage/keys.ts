import { createHash, createPrivateKey, createPublicKey, type KeyObject, sign, verify } from "node:crypto";
import { readFileSync, statSync } from "node:fs";
import path from "node:path";
import { env } from "@/lib/env";

/** The app's Ed25519 log key (RFC 8032): a file of mode 0600 beside, never inside, the database. */
export interface LogKey {
  /** SHA-256 of the public key's SPKI DER, lower-case hex */
  keyId: string;
  publicKeyPem: string;
  sign(bytes: Uint8Array): Buffer;
}

let loaded: LogKey | undefined;

export function logKey(): LogKey {
  if (loaded) return loaded;
  const file = path.join(env().dataDir, "keys", "log-key.pem");
  if ((statSync(file).mode & 0o077) !== 0) {
    throw new Error(`${file} can be read by others. Set its mode to 0600; if somebody may have copied it, change the key.`);
  }
  const secret = createPrivateKey(readFileSync(file));
  const open = createPublicKey(secret);
  loaded = { keyId: keyIdOf(open), publicKeyPem: open.export({ type: "spki", format: "pem" }) as string, sign: (bytes) => sign(null, bytes, secret) };
  return loaded;
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
