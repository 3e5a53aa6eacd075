import { closeSync, openSync, readFileSync, readSync, statSync } from "node:fs";
import { EntryFault } from "@/lib/core/verify/bag";
import { NotVerified } from "@/lib/core/verify/report";
import { againstBundle, type Here } from "./against-bundle";
import { sealsInMail } from "./mail-seals";
import { judgeOutsideSeal, type OutsideSeal, outsideSeal, sealSentence } from "./outside-seal";
import type { Damage, OutsideCopy } from "./report";
import { witnessLine } from "./witness";

/** Seals, mails and witness files are small; more is none of them. Bytes. */
const MOST_BYTES = 64 * 1024 * 1024;

export interface AgainstChecked {
  against: OutsideCopy[];
  damage: Damage[];
  notChecked: string[];
  notes: string[];
}

/** Holds the database against files from outside, told apart by what is in them. Hostile input. */
export async function checkAgainst(files: readonly string[], here: Here): Promise<AgainstChecked> {
  const found: AgainstChecked = { against: [], damage: [], notChecked: [], notes: [] };
  for (const file of files) {
    try {
      const { copy, damage, notes = [] } = await checkOne(file, here);
      found.against.push({ ...copy, agrees: damage.length === 0 });
      found.damage.push(...damage);
      found.notes.push(...notes);
    } catch (error) {
      found.notChecked.push(sentence(file, error));
    }
  }
  return found;
}

const REASONS: Record<string, string> = { ENOENT: "there is no such file", EACCES: "it may not be read by you", EISDIR: "it is a folder" };

function sentence(file: string, error: unknown): string {
  if (error instanceof NotVerified) return error.message.startsWith(file) ? error.message : `${file}: ${error.message}`;
  const { code = "", message } = error as NodeJS.ErrnoException;
  return error instanceof EntryFault ? `${file}: ${message}` : `${file}: ${REASONS[code] ?? message}.`;
}

async function checkOne(file: string, here: Here): Promise<{ copy: OutsideCopy; damage: Damage[]; notes?: string[] }> {
  const facts = statSync(file);
  if (facts.isDirectory() || startsAsZip(file)) return againstBundle(file, here);
  if (!facts.isFile()) throw new NotVerified(`${file}: it is no file.`);
  if (facts.size > MOST_BYTES) throw new NotVerified(`${file}: it is larger than any seal, mail or witness file.`);
  const bytes = readFileSync(file);
  const seal = outsideSeal(bytes.toString("utf8"), null);
  if (seal) return judged(file, "seal", [{ ...seal, signature: signatureBeside(file) }], here);
  const lines = bytes.toString("utf8").split("\n").filter((line) => line.trim() !== "");
  const witnessed = lines[0]?.startsWith("{") ? lines.map(witnessLine) : [];
  const strangers = witnessed.filter((one) => one === null).length;
  if (witnessed.length > strangers) {
    const notes = strangers > 0 ? [`${strangers} of ${witnessed.length} lines in ${file} are no seal and were left out.`] : [];
    return { ...judged(file, "witness", witnessed.filter((one) => one !== null), here), notes };
  }
  const inMail = await sealsInMail(bytes);
  if (inMail.length === 0) throw new NotVerified(`${file}: it is no seal, no mail with one, no case bundle and no witness file. Give the file as it came.`);
  return judged(file, "mail", inMail, here);
}

function startsAsZip(file: string): boolean {
  const handle = openSync(file, "r");
  try {
    const head = Buffer.alloc(4);
    return readSync(handle, head, 0, 4, 0) === 4 && head.toString("latin1").startsWith("PK") && head[2] < 8 && head[3] < 9;
  } finally {
    closeSync(handle);
  }
}

/** seal.sig beside seal.txt: 64 raw bytes, as openssl takes them. */
function signatureBeside(file: string): Uint8Array | null {
  try {
    const bytes = readFileSync(/\.[^./]*$/.test(file) ? file.replace(/\.[^./]*$/, ".sig") : `${file}.sig`);
    return bytes.length <= 4096 ? bytes : null;
  } catch {
    return null;
  }
}

function judged(file: string, kind: OutsideCopy["kind"], seals: OutsideSeal[], here: Here): { copy: OutsideCopy; damage: Damage[] } {
  const copy: OutsideCopy = { file, kind, holds: [], seals: [], heads: [], agrees: true };
  const damage: Damage[] = [];
  for (const seal of seals) {
    const one = judgeOutsideSeal(seal, here, file);
    copy.seals.push(one.copy);
    damage.push(...one.damage);
    const known = here.known.get(seal.number) === seal.sha256;
    if (seals.length <= MOST_NAMED) copy.holds.push(`${sealSentence(one.copy)} ${known ? "The database holds the very same." : "The database does not hold this one."}`);
  }
  if (seals.length > MOST_NAMED) copy.holds.push(`Seals ${seals[0].number} to ${seals[seals.length - 1].number}, ${seals.length} of them; ${damage.length === 0 ? "the database holds each of them." : `${damage.length} things are not as they should be.`}`);
  return { copy, damage };
}

/** more seals than these are told in one line */
const MOST_NAMED = 20;
