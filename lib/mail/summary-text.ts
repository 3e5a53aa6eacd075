import { comesBackSentence, leadSentence, notStarted, ownBoardSentence, promiseLimits, steps, type Summary } from "@/lib/core/summary-words";

export interface SummaryMailFacts {
  workshop: string;
  caseRef: string;
  link: string;
  expiresAt: Date;
  /** IANA name */
  timeZone: string;
  summary: Summary;
  drives: { letter: string; label: string; head: { seq: number; hash: string } }[];
  logKeyId: string;
  seal: { number: number; sha256: string; keyId: string };
}

export const summarySubject = (caseRef: string) => `Verification summary of case ${caseRef}`;

/** The mail that takes the private link to the customer, and each log's head out of the house (CUSTODY.md). */
export function summaryText(f: SummaryMailFacts): string {
  const until = new Intl.DateTimeFormat("en-GB", { dateStyle: "long", timeZone: f.timeZone }).format(f.expiresAt);
  const drives = f.drives.map((d) => `Drive ${d.letter}${d.label ? `, ${d.label}` : ""}: entry ${d.head.seq}\n${d.head.hash}\n`).join("\n");
  const format = new Intl.DateTimeFormat("en-GB", { day: "numeric", month: "short", year: "numeric", timeZone: f.timeZone });
  const day = (iso: string) => format.format(new Date(iso));
  const several = f.summary.drives.length > 1;
  const untested = notStarted(f.summary);
  const done = [
    ...f.summary.drives.map((drive) => `${several ? `Drive ${drive.letter}: ` : ""}${ownBoardSentence(drive)}`),
    ...steps(f.summary, day).map((step) => `${step.day}: ${step.text}`), ...(untested ? [untested] : []),
  ];
  return `Hello,

the chip transfer of your case ${f.caseRef} is done.

${wrapped(leadSentence(f.summary))}

The summary shows it on one sheet that you can print or download as a PDF:

${f.link}

The link is private: whoever has it can open the summary. It works until
${until}.
${f.summary.twoPersonRule ? "" : "\nThe two-person rule was switched off: one person could read and approve.\n"}
What was done

${list(done)}

What comes back to you

${wrapped(comesBackSentence(f.summary, day))}

What this does not promise

${list(promiseLimits(f.summary))}

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

const WIDTH = 76;

/** Lines of a readable length; a word longer than one stays whole. */
function wrapped(text: string, indent = ""): string {
  const lines: string[] = [];
  for (const word of text.split(" ")) {
    const last = lines.at(-1);
    if (last !== undefined && last.length + 1 + word.length <= WIDTH - indent.length) lines[lines.length - 1] = `${last} ${word}`;
    else lines.push(word);
  }
  return lines.join(`\n${indent}`);
}

const list = (items: readonly string[]) => items.map((item) => `- ${wrapped(item, "  ")}`).join("\n");
