export interface SummaryMailFacts {
  workshop: string;
  caseRef: string;
  link: string;
  expiresAt: Date;
  /** IANA name */
  timeZone: string;
  twoPersonRule: boolean;
  drives: { letter: string; label: string; head: { seq: number; hash: string } }[];
  logKeyId: string;
  seal: { number: number; sha256: string; keyId: string };
}

export const summarySubject = (caseRef: string) => `Verification summary of case ${caseRef}`;

/** The mail that takes the private link to the customer, and each log's head out of the house (CUSTODY.md). */
export function summaryText(f: SummaryMailFacts): string {
  const until = new Intl.DateTimeFormat("en-GB", { dateStyle: "long", timeZone: f.timeZone }).format(f.expiresAt);
  const drives = f.drives.map((d) => `Drive ${d.letter}${d.label ? `, ${d.label}` : ""}: entry ${d.head.seq}\n${d.head.hash}\n`).join("\n");
  return `Hello,

the chip transfer of your case ${f.caseRef} is done. Afterwards the chip on the donor
board was read again, and what it holds equals the approved image in every byte.
The summary shows it on one sheet that you can print:

${f.link}

The link is private: whoever has it can open the summary. It works until
${until}.
${f.twoPersonRule ? "" : "\nThe two-person rule was switched off: one person could read and approve.\n"}
Keep this mail. Below is where the custody log of each drive stood when it was
written. A log that was changed later no longer fits these numbers.

${drives}
Fingerprint of the key that signs the logs
${f.logKeyId}

Seal ${f.seal.number} is the workshop's signed statement of where all its logs stood, these
among them. SHA-256 of the seal, and the fingerprint of the key that signs seals:
${f.seal.sha256}
${f.seal.keyId}

${f.workshop}
`;
}
