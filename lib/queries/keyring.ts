import { createPublicKey } from "node:crypto";
import { signedBytes } from "@/lib/core/custody";
import { keyIdOf, verifySignature } from "@/storage";

export interface KeyEntry {
  seq: number;
  body: Buffer;
  signature: Buffer;
  keyId: string;
}

export interface Keyring {
  /** PEM of every key that may sign the log, by its id */
  keys: Map<string, string>;
  /** what is wrong with an entry that introduces a key */
  problems: { seq: number; sentence: string }[];
}

interface Introduced {
  keyId: string;
  purpose: string;
  publicKeyPem: string;
}

/**
 * Which keys the log may be signed with (CUSTODY.md, "Custody entry"): the first introduces itself, each later one is
 * signed by a key that counted before it. An entry that anybody could have inserted with a key of their own is refused.
 * `fromFolder` is the public key of the data folder, outside the database: it has to be among them.
 */
export function keyring(entries: KeyEntry[], fromFolder: string | null): Keyring {
  const keys = new Map<string, string>();
  const problems: Keyring["problems"] = [];
  for (const entry of entries) {
    const refuse = (sentence: string) => problems.push({ seq: entry.seq, sentence });
    const facts = read(entry.body);
    if (!facts) {
      refuse("The entry that introduces a key cannot be read.");
      continue;
    }
    if (facts.purpose !== "log") continue;
    if (idOf(facts.publicKeyPem) !== facts.keyId) {
      refuse("The key's id is not the fingerprint of the key beside it.");
      continue;
    }
    const signer = keys.size === 0 ? (entry.keyId === facts.keyId ? facts.publicKeyPem : undefined) : keys.get(entry.keyId);
    if (signer === undefined) refuse(keys.size === 0 ? "The first key is not introduced by itself." : "A key was introduced that no earlier key signed for: somebody else may have put it there.");
    else if (!verifySignature(signer, signedBytes(entry.body), entry.signature)) refuse("The signature over the new key does not fit.");
    else keys.set(facts.keyId, facts.publicKeyPem);
  }
  if (fromFolder !== null) {
    const id = idOf(fromFolder);
    if (id === null) problems.push({ seq: entries.at(-1)?.seq ?? 0, sentence: "log-key.pub.pem in the data folder is not a key." });
    else if (entries.length > 0 && !keys.has(id)) problems.push({ seq: entries.at(-1)?.seq ?? 0, sentence: "The log key of the data folder is not among the keys that the log introduces." });
  }
  return { keys, problems };
}

/** Hostile input: the body may be anything. */
function read(body: Buffer): Introduced | null {
  try {
    const { facts } = JSON.parse(body.toString("utf8")) as { facts?: Partial<Introduced> };
    if (typeof facts?.keyId !== "string" || typeof facts.purpose !== "string" || typeof facts.publicKeyPem !== "string") return null;
    return { keyId: facts.keyId, purpose: facts.purpose, publicKeyPem: facts.publicKeyPem };
  } catch {
    return null;
  }
}

function idOf(pem: string): string | null {
  try {
    return keyIdOf(createPublicKey(pem));
  } catch {
    return null;
  }
}
