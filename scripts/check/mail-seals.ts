import { simpleParser } from "mailparser";
import { newestSealIn } from "@/lib/mail/seal-text";
import { type OutsideSeal, outsideSeal, signatureOf } from "./outside-seal";

/** larger HTML is left alone: a mail of ours has none */
const MOST_HTML = 1_000_000;
const MOST_DEPTH = 5;

/** A line without the marks that forwarding and quoting put before it, and without what a line end leaves. */
const bare = (line: string) => line.replace(/^[\s>|]+/, "").trimEnd();

/** Seals in a text: six lines each, quoted or not, blank lines between them or not, and the signature below. */
export function sealsInText(text: string): OutsideSeal[] {
  const lines = text.replace(/\u00a0/g, " ").split(/\r\n|\r|\n/).map(bare).filter((line) => line !== "");
  const found: OutsideSeal[] = [];
  lines.forEach((line, i) => {
    if (line !== "twinread-seal/1") return;
    const seal = outsideSeal(`${lines.slice(i, i + 6).join("\n")}\n`, signatureBelow(lines.slice(i + 6, i + 10)));
    if (seal) found.push(seal);
  });
  return [...found, ...mentions(text, lines)];
}

/** In base64, on one line or broken by a mail program. */
function signatureBelow(lines: string[]): Uint8Array | null {
  for (const i of lines.keys()) {
    for (let n = 1; n <= 3; n += 1) {
      const signature = signatureOf(lines.slice(i, i + n).join(""));
      if (signature) return signature;
    }
  }
  return null;
}

/** Number and digest alone: the last lines of each mail, and the header that each carries. */
function mentions(text: string, lines: string[]): OutsideSeal[] {
  const found: [string, string][] = [];
  lines.forEach((line, i) => {
    const newest = newestSealIn(`\n${line}\n${lines[i + 1] ?? ""}\n`);
    if (newest) found.push([String(newest.number), newest.sha256]);
  });
  for (const [, number, sha256] of text.matchAll(/^[\s>|]*X-Twinread-Seal:\s+([1-9]\d{0,9})\s+([0-9a-f]{64})\b/gim)) found.push([number, sha256]);
  return found.map(([number, sha256]) => ({ number: Number(number), sha256, at: null, text: null, signature: null }));
}

/** All seals of a mail, its attachments and the mails within it. Hostile input: what cannot be taken apart is read as plain text. */
export async function sealsInMail(source: Buffer, depth = 0): Promise<OutsideSeal[]> {
  const found = sealsInText(source.toString("utf8"));
  if (depth < MOST_DEPTH && /^[!-9;-~]+:/m.test(source.subarray(0, 4096).toString("latin1"))) {
    try {
      const mail = await simpleParser(source, { maxHtmlLengthToParse: MOST_HTML, skipImageLinks: true, skipTextToHtml: true, skipTextLinks: true });
      found.push(...sealsInText(mail.text ?? ""));
      for (const { content, contentType } of mail.attachments) {
        if (contentType === "message/rfc822" || contentType.startsWith("text/")) found.push(...(await sealsInMail(content, depth + 1)));
      }
    } catch {
      // the plain look above stands
    }
  }
  return distinct(found);
}

/** One of each; the fuller one stays. */
function distinct(seals: OutsideSeal[]): OutsideSeal[] {
  const kept = new Map<string, OutsideSeal>();
  for (const seal of seals) {
    const key = `${seal.number} ${seal.sha256}`;
    const before = kept.get(key);
    if (!before || (!before.text && seal.text) || (!before.signature && seal.signature && seal.text)) kept.set(key, seal);
  }
  return [...kept.values()].sort((a, b) => a.number - b.number);
}
