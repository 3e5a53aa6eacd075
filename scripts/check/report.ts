import type { ChainProblem } from "@/lib/core/custody";

type ImageProblem = "image-damaged" | "image-missing" | "image-record" | "image-left" | "image-not-in-log";
type RecordProblem =
  | "read-differs-from-log" | "read-not-in-log" | "read-missing" | "approval-differs-from-log" | "approval-not-in-log" | "approval-missing"
  | "transfer-differs-from-log" | "transfer-not-in-log" | "transfer-missing" | "account-differs-from-log" | "account-not-in-log" | "policy-differs-from-log"
  | "thing-differs-from-log" | "thing-not-in-log" | "thing-missing";
type SealProblem = "seal" | "seal-row" | "seal-missing" | "seal-not-in-log" | "seal-chain" | "seal-leaves" | "sealed-entry" | "sealed-entry-missing" | "witness";
type OutsideProblem = "outside-file" | "outside-key" | "outside-seal" | "outside-seal-missing" | "outside-entry" | "outside-entry-missing" | "outside-image";

/** One thing that is not as it was written down. */
export interface Damage {
  /** for people: "Case 26-0042, Drive A" */
  place: string;
  /** the entry of the chain, where there is one */
  seq: number | null;
  problem: ChainProblem | "key" | "no-log" | ImageProblem | RecordProblem | SealProblem | OutsideProblem;
  sentence: string;
  chain: string | null;
  /** SHA-256 of the stored image, lower-case hex */
  sha256: string | null;
  /** every read that the damage touches, "Case 26-0042, Drive A, Orig U12, Read 2" */
  reads: string[];
  expected?: string;
  found?: string;
  /** the file from outside that shows it */
  file?: string;
}

/** A file from outside that the database was held against. */
export interface OutsideCopy {
  file: string;
  kind: "seal" | "mail" | "bundle" | "witness";
  /** sentences for people: what it holds, and what could be said of it */
  holds: string[];
  seals: { number: number; sha256: string; signature: "fits" | "does not fit" | "not given" }[];
  heads: { chain: string; place: string; seq: number; hash: string }[];
  agrees: boolean;
}

export interface StoreReport {
  /** RFC 3339, UTC */
  checkedAt: string;
  clean: boolean;
  chains: { chain: string; place: string; entries: number; head: { seq: number; hash: string } | null; findings: number }[];
  signatures: number;
  keys: string[];
  seals: { checked: number; newest: { number: number; at: string; sha256: string } | null; heads: number; keys: string[] };
  /** the witness file of this data folder; null where there is none */
  witness: { path: string; seals: number } | null;
  images: { checked: number; bytes: number; damaged: number; missing: number; erased: number };
  reads: number;
  against: OutsideCopy[];
  damage: Damage[];
  /** sentences; what stands here was not checked, so nothing is known of it */
  notChecked: string[];
  /** sentences worth reading that are neither damage nor left out */
  notes: string[];
  /** files in the store that no row knows, left by uploads that were cut short: clutter, not damage */
  unknownFiles: number;
}

/** 0 clean, 1 damage found, 2 could not check. Found damage stays damage when something else could not be checked. */
export function exitCode(report: Pick<StoreReport, "damage" | "notChecked">): 0 | 1 | 2 {
  if (report.damage.length > 0) return 1;
  return report.notChecked.length > 0 ? 2 : 0;
}

const count = (n: number, one: string, many = `${one}s`) => `${n.toLocaleString("en")} ${n === 1 ? one : many}`;

function sealLines({ seals, witness }: StoreReport): string[] {
  const newest = seals.newest ? `, the newest is seal ${seals.newest.number} of ${seals.newest.at}, SHA-256 ${seals.newest.sha256}` : "";
  return [
    `${count(seals.checked, "seal")} over ${count(seals.heads, "head")}${newest}`,
    ...(witness ? [`Witness file ${witness.path}: ${count(witness.seals, "seal")}`] : []),
  ];
}

function outsideLines(copies: OutsideCopy[]): string[] {
  return copies.flatMap((copy) => [`${copy.file}: ${copy.agrees ? "agrees with the database." : "DOES NOT AGREE with the database."}`, ...copy.holds.map((line) => `    ${line}`)]);
}

/** The page for people. */
export function page(report: StoreReport): string {
  const entries = report.chains.reduce((sum, { entries: n }) => sum + n, 0);
  const lines = [
    `Checked ${report.checkedAt}`,
    `${count(report.chains.length, "log")}, ${count(entries, "entry", "entries")}, ${count(report.signatures, "signature")}`,
    ...sealLines(report),
    `${count(report.images.checked, "stored image")}, ${count(report.images.bytes, "byte")}, ${count(report.reads, "read")}${report.images.erased > 0 ? `; ${count(report.images.erased, "image")} erased, as the log says` : ""}`,
    ...report.keys.map((key) => `Log key ${key}`),
    ...report.seals.keys.map((key) => `Seal key ${key}`),
    ...outsideLines(report.against),
    "",
  ];
  for (const damage of report.damage) {
    lines.push(`${damage.place}${damage.seq === null ? "" : `, entry ${damage.seq}`}: ${damage.sentence}`);
    if (damage.expected !== undefined) lines.push(`    expected ${damage.expected}`);
    if (damage.found !== undefined) lines.push(`    found    ${damage.found}`);
    if (damage.file !== undefined) lines.push(`    shown by ${damage.file}`);
    for (const read of damage.reads) lines.push(`    touches  ${read}`);
  }
  lines.push(...report.notes);
  for (const sentence of report.notChecked) lines.push(`Not checked: ${sentence}`);
  if (report.unknownFiles > 0) lines.push(`${count(report.unknownFiles, "file")} in the store belong to no read: left by uploads that were cut short, harmless.`);
  lines.push(report.damage.length > 0
    ? `${count(report.damage.length, "thing")} not as written down. Nothing was changed. Keep this page, stop handing out images of these drives, and compare with your backup.`
    : report.notChecked.length > 0 ? "Nothing wrong in what could be checked, but not all could be." : "All clean: every log, every signature, every seal, every stored image.");
  return lines.join("\n");
}
