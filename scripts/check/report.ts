import type { ChainProblem } from "@/lib/core/custody";

/** One thing that is not as it was written down. */
export interface Damage {
  /** for people: "Case 26-0042, Drive A" */
  place: string;
  /** the entry of the chain, where there is one */
  seq: number | null;
  problem: ChainProblem | "key" | "no-log" | "image-damaged" | "image-missing" | "image-record" | "read-differs-from-log" | "read-not-in-log" | "read-missing" | "approval-differs-from-log" | "approval-not-in-log";
  sentence: string;
  chain: string | null;
  /** SHA-256 of the stored image, lower-case hex */
  sha256: string | null;
  /** every read that the damage touches, "Case 26-0042, Drive A, Orig U12, Read 2" */
  reads: string[];
  expected?: string;
  found?: string;
}

export interface StoreReport {
  /** RFC 3339, UTC */
  checkedAt: string;
  clean: boolean;
  chains: { chain: string; place: string; entries: number; head: { seq: number; hash: string } | null; findings: number }[];
  signatures: number;
  keys: string[];
  images: { checked: number; bytes: number; damaged: number; missing: number };
  reads: number;
  damage: Damage[];
  /** sentences; what stands here was not checked, so nothing is known of it */
  notChecked: string[];
  /** files in the store that no row knows, left by uploads that were cut short: clutter, not damage */
  unknownFiles: number;
}

/** 0 clean, 1 damage found, 2 could not check. Found damage stays damage when something else could not be checked. */
export function exitCode(report: Pick<StoreReport, "damage" | "notChecked">): 0 | 1 | 2 {
  if (report.damage.length > 0) return 1;
  return report.notChecked.length > 0 ? 2 : 0;
}

const count = (n: number, one: string, many = `${one}s`) => `${n.toLocaleString("en")} ${n === 1 ? one : many}`;

/** The page for people. */
export function page(report: StoreReport): string {
  const entries = report.chains.reduce((sum, { entries: n }) => sum + n, 0);
  const lines = [
    `Checked ${report.checkedAt}`,
    `${count(report.chains.length, "log")}, ${count(entries, "entry", "entries")}, ${count(report.signatures, "signature")}`,
    `${count(report.images.checked, "stored image")}, ${count(report.images.bytes, "byte")}, ${count(report.reads, "read")}`,
    ...report.keys.map((key) => `Log key ${key}`),
    "",
  ];
  for (const damage of report.damage) {
    lines.push(`${damage.place}${damage.seq === null ? "" : `, entry ${damage.seq}`}: ${damage.sentence}`);
    if (damage.expected !== undefined) lines.push(`    expected ${damage.expected}`);
    if (damage.found !== undefined) lines.push(`    found    ${damage.found}`);
    for (const read of damage.reads) lines.push(`    touches  ${read}`);
  }
  for (const sentence of report.notChecked) lines.push(`Not checked: ${sentence}`);
  if (report.unknownFiles > 0) lines.push(`${count(report.unknownFiles, "file")} in the store belong to no read: left by uploads that were cut short, harmless.`);
  lines.push(report.damage.length > 0
    ? `${count(report.damage.length, "thing")} not as written down. Nothing was changed. Keep this page, stop handing out images of these drives, and compare with your backup.`
    : report.notChecked.length > 0 ? "Nothing wrong in what could be checked, but not all could be." : "All clean: every log, every signature, every stored image.");
  return lines.join("\n");
}
