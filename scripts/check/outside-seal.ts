import { createHash } from "node:crypto";
import { parseSeal, type SealFacts } from "@/lib/core/seal";
import { verifySignature } from "@/storage";
import type { Ledger } from "./ledger";
import type { Damage, OutsideCopy } from "./report";

/** A seal, or only its number and digest, that came from outside. */
export interface OutsideSeal {
  number: number;
  sha256: string;
  at: string | null;
  text: string | null;
  signature: Uint8Array | null;
}

/** Hostile input: null for a text that is no seal to the letter. */
export function outsideSeal(text: string, signature: Uint8Array | null): OutsideSeal | null {
  const facts: SealFacts | null = parseSeal(text);
  return facts && { number: facts.number, at: facts.at, sha256: createHash("sha256").update(text).digest("hex"), text, signature };
}

/** Signature in base64; null for anything that is not 64 bytes. */
export function signatureOf(base64: string): Uint8Array | null {
  if (!/^[A-Za-z0-9+/]{86}==$/.test(base64)) return null;
  return Buffer.from(base64, "base64");
}

export interface SealsHere {
  ledger: Ledger;
  /** SHA-256 of each seal's text here, by its number */
  known: ReadonlyMap<number, string>;
}

/** What the database says to a seal from outside, and what is wrong with either. */
export function judgeOutsideSeal(seal: OutsideSeal, { ledger, known }: SealsHere, file: string): { copy: OutsideCopy["seals"][number]; damage: Damage[] } {
  const signature = !seal.text || !seal.signature ? "not given" : [...ledger.ring.sealKeys.values()].some((pem) => verifySignature(pem, Buffer.from(seal.text!), seal.signature!)) ? "fits" : "does not fit";
  const damage: Damage[] = [];
  const say = (problem: Damage["problem"], sentence: string, expected?: string, found?: string) =>
    damage.push({ place: `Seal ${seal.number}`, seq: null, problem, sentence, chain: null, sha256: null, reads: [], expected, found, file });
  const here = known.get(seal.number);
  const unsigned = signature === "not given" ? " The file gives no signature for it: make sure where the file came from." : "";
  const when = seal.at ? ` of ${seal.at}` : "";
  if (signature === "does not fit") say("outside-seal", "The signature beside it fits none of the seal keys that the workshop's log introduces: somebody else made this seal or changed it, or the keys here were replaced.");
  if (here === undefined) {
    const told = ledger.sealsMade.some((one) => one.number === seal.number && one.sha256 === seal.sha256);
    say("outside-seal-missing", told
      ? `The database does not hold seal ${seal.number}${when}, and the workshop's log says that it was made: it was removed.`
      : `The database does not hold seal ${seal.number}${when}: it was put back to an earlier state, or the seal was removed.${unsigned}`, seal.sha256, "no such seal");
  } else if (here !== seal.sha256) say("outside-seal", `The database holds another seal ${seal.number}: its past was written anew, or this file was.${unsigned}`, seal.sha256, here);
  return { copy: { number: seal.number, sha256: seal.sha256, signature }, damage };
}

const WORDS: Record<OutsideCopy["seals"][number]["signature"], string> = { fits: "its signature fits", "does not fit": "ITS SIGNATURE DOES NOT FIT", "not given": "its signature is not given" };

/** "Seal 43, its signature fits." */
export function sealSentence({ number, signature }: OutsideCopy["seals"][number]): string {
  return `Seal ${number}: ${WORDS[signature]}.`;
}
