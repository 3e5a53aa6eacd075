import { signedBytes } from "./custody";

/** An entry of the workshop's chain that introduces a key. */
export interface KeyEntry {
  seq: number;
  body: Uint8Array;
  signature: Uint8Array;
  /** id of the key that signed the entry */
  keyId: string;
}

export interface Keyring {
  /** PEM of every key that may sign the log, by its id, oldest first: the last is the one in use */
  keys: Map<string, string>;
  /** PEM of every key that may sign seals, by its id, oldest first */
  sealKeys: Map<string, string>;
  /** what is wrong with an entry that introduces a key */
  problems: { seq: number; sentence: string }[];
}

export interface KeyTools {
  /** SHA-256 of the public key's SPKI DER in lower-case hex; null for what is no Ed25519 key in PEM */
  keyId(publicKeyPem: string): string | null;
  /** Ed25519; false for anything that does not hold */
  verify(publicKeyPem: string, bytes: Uint8Array, signature: Uint8Array): boolean;
}

interface Introduced {
  keyId: string;
  purpose: string;
  publicKeyPem: string;
}

/**
 * Which keys the log and the seals may be signed with (CUSTODY.md, "Custody entry"): the first introduces itself, each
 * later one is signed by the log key in use at that time, so that neither a stranger's key nor a replaced one can
 * introduce another. `fromFolder` is the log key of the data folder, outside the database, or of the bundle: it has to
 * be among them. Hostile input.
 */
export function keyring(entries: readonly KeyEntry[], tools: KeyTools, fromFolder: string | null): Keyring {
  const ring: Keyring = { keys: new Map(), sealKeys: new Map(), problems: [] };
  for (const entry of entries) {
    const sentence = introduce(ring, entry, tools);
    if (sentence !== null) ring.problems.push({ seq: entry.seq, sentence });
  }
  if (fromFolder !== null) {
    const id = tools.keyId(fromFolder);
    const seq = entries.at(-1)?.seq ?? 0;
    if (id === null) ring.problems.push({ seq, sentence: "log-key.pub.pem in the data folder is not a key." });
    else if (entries.length > 0 && !ring.keys.has(id)) ring.problems.push({ seq, sentence: "The log key of the data folder is not among the keys that the log introduces." });
  }
  return ring;
}

/** Takes the key in, or says why not. */
function introduce({ keys, sealKeys }: Keyring, entry: KeyEntry, tools: KeyTools): string | null {
  const facts = read(entry.body);
  if (!facts) return "The entry that introduces a key cannot be read.";
  if (tools.keyId(facts.publicKeyPem) !== facts.keyId) return "The key's id is not the fingerprint of the key beside it.";
  const first = keys.size === 0;
  if (first && (facts.purpose !== "log" || entry.keyId !== facts.keyId)) return "The first key is not introduced by itself.";
  const signer = first ? facts.publicKeyPem : keys.get(entry.keyId);
  if (signer === undefined) return "A key was introduced that no earlier key signed for: somebody else may have put it there.";
  if (!tools.verify(signer, signedBytes(entry.body), entry.signature)) return "The signature over the new key does not fit.";
  if (!first && entry.keyId !== [...keys.keys()].at(-1)) return "A key was introduced by a log key that had been replaced: somebody may have kept the former key.";
  if (facts.purpose === "log") keys.set(facts.keyId, facts.publicKeyPem);
  else if (facts.purpose === "seal") sealKeys.set(facts.keyId, facts.publicKeyPem);
  else return "The entry introduces a key for a purpose that is not known.";
  return null;
}

function read(body: Uint8Array): Introduced | null {
  try {
    const { facts } = JSON.parse(new TextDecoder("utf-8", { fatal: true }).decode(body)) as { facts?: Partial<Introduced> };
    if (typeof facts?.keyId !== "string" || typeof facts.purpose !== "string" || typeof facts.publicKeyPem !== "string") return null;
    return { keyId: facts.keyId, purpose: facts.purpose, publicKeyPem: facts.publicKeyPem };
  } catch {
    return null;
  }
}

/** The place of each log key in the order of introduction, for the check of a chain. */
export function keyOrder({ keys }: Pick<Keyring, "keys">): (keyId: string) => number | undefined {
  const places = new Map([...keys.keys()].map((id, i) => [id, i]));
  return (keyId) => places.get(keyId);
}
