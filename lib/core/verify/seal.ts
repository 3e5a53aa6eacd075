import { z } from "zod";
import { canonicalJson } from "../canonical";
import { LOG_KEY, SEAL_KEY, SEAL_PROOF, SEAL_SIGNATURE, SEAL_TEXT } from "../bundle-layout";
import type { Keyring } from "../keyring";
import { parseSeal, proofHolds, type SealFacts, type SealProof } from "../seal";
import { countOf } from "../quantity";
import type { Files } from "./lists";
import type { DriveLog } from "./log";
import { textOf } from "./read-files";
import { type Step, StepNotes } from "./report";
import { keyTools, sha256Of, type VerifyTools } from "./tools";

export interface SealSeen {
  facts: SealFacts | null;
  keyId: string | null;
  /** bundles made before there were seals have none */
  absent: boolean;
}

export function checkSeal(files: Files, ring: Keyring, tools: VerifyTools): { step: Step; seen: SealSeen } {
  const notes = new StepNotes("seal", "The seal");
  const parts = [SEAL_TEXT, SEAL_SIGNATURE, SEAL_KEY, SEAL_PROOF];
  if (parts.every((path) => !files.has(path))) {
    const seen = { facts: null, keyId: null, absent: true };
    if (ring.sealKeys.size > 0) notes.fault(SEAL_TEXT, "It is missing, and the workshop had a seal key when this bundle was made.");
    return { step: notes.notChecked("This bundle carries no seal: it was made before the workshop sealed its logs."), seen };
  }
  for (const path of parts) if (!files.has(path)) notes.fault(path, "It is missing.");
  const source = textOf(files, SEAL_TEXT);
  const facts = source === null ? null : parseSeal(source);
  if (files.has(SEAL_TEXT) && !facts) notes.fault(SEAL_TEXT, "It is not a seal twinread-seal/1 to the letter.", undefined, source ?? "no text");
  const pem = textOf(files, SEAL_KEY);
  const keyId = pem === null ? null : keyTools(tools).keyId(pem);
  if (files.has(SEAL_KEY) && keyId === null) notes.fault(SEAL_KEY, "It is not an Ed25519 public key in PEM.");
  const newest = [...ring.sealKeys.keys()].at(-1);
  if (keyId !== null && !ring.sealKeys.has(keyId)) notes.fault(SEAL_KEY, "It is not among the seal keys that the workshop's log introduces.", newest, keyId);
  else if (keyId !== null && keyId !== newest) notes.fault(SEAL_KEY, "It is a seal key that was replaced before this bundle was made.", newest, keyId);
  const [bytes, signature] = [files.get(SEAL_TEXT)?.bytes, files.get(SEAL_SIGNATURE)?.bytes];
  if (pem !== null && keyId !== null && bytes && signature && !keyTools(tools).verify(pem, bytes, signature)) {
    notes.fault(SEAL_SIGNATURE, "It does not fit the seal and the seal key: one of the three was changed, or somebody else made this seal.");
  }
  const words = facts ? `Seal ${facts.number} of ${facts.at} over ${countOf(facts.chains, "log")}, signed by a seal key that the workshop's log introduces.` : "";
  return { step: notes.done(words), seen: { facts, keyId, absent: false } };
}

const hash = z.string().regex(/^[0-9a-f]{64}$/);
const proofShape = z.strictObject({
  format: z.literal("twinread-proof/1"), seal: z.int(), chains: z.int(),
  proofs: z.array(z.strictObject({ drive: z.string(), head: hash, seq: z.int(), index: z.int().min(0), path: z.array(hash).max(64) })).max(100_000),
});

/** Each drive's log, as it ends in this bundle, is among those that the seal was made over (RFC 9162, section 2.1.3). */
export function checkProof(files: Files, seen: SealSeen, logs: readonly DriveLog[], tools: VerifyTools): Step {
  const notes = new StepNotes("proof", "Each log's place in the seal");
  if (seen.absent) return notes.notChecked("Without a seal there is nothing to prove.");
  const { facts } = seen;
  const proof = proofOf(files, notes);
  if (!facts || !proof) return notes.notChecked("There is no seal that a log could be found in.");
  if (proof.seal !== facts.number) notes.fault(SEAL_PROOF, "It belongs to another seal.", String(facts.number), String(proof.seal));
  if (proof.chains !== facts.chains) notes.fault(SEAL_PROOF, "It is over another number of logs than the seal.", String(facts.chains), String(proof.chains));
  for (const log of logs) {
    const mine = proof.proofs.filter((one) => one.drive === log.chain);
    if (mine.length !== 1) {
      notes.fault(SEAL_PROOF, mine.length === 0 ? `It says nothing of drive ${log.drive}.` : `It names drive ${log.drive} more than once.`);
      continue;
    }
    const [one] = mine;
    if (one.seq !== log.head.seq || one.head !== log.head.hash) {
      notes.fault(`${SEAL_PROOF}, drive ${log.drive}`, "The log ends elsewhere than where the seal saw it.", `entry ${one.seq}, ${one.head}`, `entry ${log.head.seq}, ${log.head.hash}`);
    }
    if (!proofHolds(facts, one, (bytes) => sha256Of(bytes, tools))) notes.fault(`${SEAL_PROOF}, drive ${log.drive}`, "The way from this log's end does not lead to the seal's root.", facts.root);
  }
  if (proof.proofs.length !== logs.length) notes.fault(SEAL_PROOF, "It has another number of proofs than the bundle has logs.", String(logs.length), String(proof.proofs.length));
  return notes.done(`${countOf(logs.length, "log")}: the last entry of each is under the seal's root.`);
}

function proofOf(files: Files, notes: StepNotes): SealProof | null {
  const source = textOf(files, SEAL_PROOF);
  if (source === null) {
    notes.fault(SEAL_PROOF, files.has(SEAL_PROOF) ? "It is not text in UTF-8." : "It is missing.");
    return null;
  }
  try {
    const parsed = proofShape.safeParse(JSON.parse(source));
    if (parsed.success && canonicalJson(parsed.data) === source) return parsed.data;
  } catch {
    // falls through: what is no JSON is no proof either
  }
  notes.fault(SEAL_PROOF, "It is not a proof twinread-proof/1 in its canonical form.");
  return null;
}

/** A fingerprint as people paste it: 64 hex digits, with spaces or colons or in capitals; null for anything else. */
export function fingerprintOf(text: string): string | null {
  const plain = text.replace(/[\s:]/g, "").toLowerCase();
  return /^[0-9a-f]{64}$/.test(plain) ? plain : null;
}

/** Whose keys they are: only what came another way than the bundle can say. */
export function checkFingerprint(expected: string | null, logKey: string | null, sealKey: string | null, ring: Keyring): Step {
  const notes = new StepNotes("fingerprint", "Whose keys they are");
  if (expected === null) {
    return notes.notChecked("Keys not compared: whoever makes a whole bundle of their own can put a key of their own in. Compare the fingerprint with the one in the mail or on the summary.");
  }
  if (expected === logKey) return notes.done("The log key has the fingerprint that you gave.");
  if (expected === sealKey) return notes.done("The seal key has the fingerprint that you gave.");
  const replaced = [ring.keys, ring.sealKeys].some((keys) => keys.has(expected) && [...keys.keys()].at(-1) !== expected);
  notes.fault(logKey === null ? LOG_KEY : "The keys in the bundle", replaced
    ? "You gave the fingerprint of a key that was replaced before this bundle was made. Take it from a newer mail or summary."
    : "Neither the log key nor the seal key has the fingerprint that you gave: somebody else may have made this bundle.", expected, [logKey, sealKey].filter((key) => key !== null).join(" and ") || "no key");
  return notes.done("");
}
