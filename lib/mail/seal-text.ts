export interface SealMailFacts {
  workshop: string;
  number: number;
  /** the seal's six lines, each with its newline */
  text: string;
  /** base64 */
  signature: string;
  keyId: string;
  sha256: string;
}

export const sealMailSubject = (number: number, workshop: string) => `Seal ${number} of ${workshop}`;

/** The mail that takes a seal to an auditor. Its six lines and the signature stand each on a line of its own, unchanged. */
export function sealMailText(f: SealMailFacts): string {
  return `Hello,

this is seal ${f.number} of the custody logs of ${f.workshop}: a signed
statement of where each log stood when it was made.

${f.text}
Signature (Ed25519, base64)
${f.signature}

Fingerprint of the key that signs the seals
${f.keyId}

Keep this mail where the workshop can't reach it. The six lines from
"twinread-seal/1" on, saved as seal.txt with a newline at the end of each, are
what is signed. Whoever has the seal's key, from a bundle or from the workshop,
checks it with
  openssl base64 -d -A -in signature.txt -out seal.sig
  openssl pkeyutl -verify -pubin -inkey seal-key.pem -rawin -in seal.txt -sigfile seal.sig
Compare the fingerprint with the one in an earlier mail and in each bundle: it
changes only when the workshop has told you why. The sixth line is the SHA-256
of the seal before this one. A log that was changed, cut or replaced after this seal
no longer fits it: the workshop's own check takes this mail as it is.

${f.workshop}
`;
}

export interface SealMark {
  number: number;
  sha256: string;
}

const NEWEST = "Newest seal of this workshop's logs:";

/** A mail's text with the newest seal as its last lines; without one, the text as it is. */
export function withNewestSeal(text: string, seal: SealMark | null): string {
  return seal ? `${text.replace(/\n*$/, "\n")}\n${NEWEST} ${seal.number}\nSHA-256 ${seal.sha256}\n` : text;
}

/** What the last lines of a mail say about the newest seal. */
export function newestSealIn(text: string): SealMark | null {
  const found = /\nNewest seal of this workshop's logs: ([1-9]\d{0,9})\nSHA-256 ([0-9a-f]{64})\n$/.exec(text);
  return found && { number: Number(found[1]), sha256: found[2] };
}
