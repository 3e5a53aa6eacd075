import { type BagEntry, layOut, MOST_ENTRIES } from "./bag";
import { checkKeys, checkTagSignature, logKeyOf } from "./keys";
import { checkCount, checkDeclaration, checkManifest, checkTagManifest, type Files } from "./lists";
import { checkLog, type DriveLog, drivesIn } from "./log";
import { readFiles } from "./read-files";
import { checkRecord } from "./record";
import { type BundleFacts, type Fault, NotVerified, type Step, StepNotes, type VerifyReport, verdictOf } from "./report";
import { checkFingerprint, checkProof, checkSeal } from "./seal";
import type { VerifyTools } from "./tools";
import { sizeText } from "../quantity";

export interface Progress {
  /** what is being checked, for people: "data/case.json", "the custody log of drive 1" */
  what: string;
  doneBytes: number;
  totalBytes: number;
}

export interface VerifyInput {
  entries: readonly BagEntry[];
  /** an archive has check sums of its own; a folder has none */
  source: "archive" | "folder";
  /** what the archive's reader found before any entry was opened */
  archiveFaults?: readonly Fault[];
  tools: VerifyTools;
  /** 64 lower-case hex digits (fingerprintOf): the log's or the seal's key, from elsewhere than the bundle */
  expectedKey?: string | null;
  onProgress?(progress: Progress): void;
  signal?: AbortSignal;
}

/**
 * Checks a case bundle in every part (CUSTODY.md, "Case bundle") and says of each what was found. The bundle is taken
 * for hostile: nothing in it makes this throw. Throws NotVerified where the check can't be made (more files or larger
 * lists than any bundle has), and the signal's reason when it is stopped. Images flow through; lists and logs are held.
 */
export async function verifyBundle({ entries, source, archiveFaults = [], tools, expectedKey = null, onProgress, signal }: VerifyInput): Promise<VerifyReport> {
  if (entries.length > MOST_ENTRIES) throw new NotVerified(`It holds ${entries.length} files, more than any bundle. Check that it is one.`);
  const container = new StepNotes("archive", source === "archive" ? "The archive" : "The folder");
  // an archive without a readable directory is just that; what it would hold is not known
  const unreadable = entries.length === 0 && archiveFaults.length > 0;
  const { folder, files: found } = unreadable ? { folder: "", files: new Map<string, BagEntry>() } : layOut(entries, container);
  const say = (what: string, doneBytes = 0, totalBytes = 0) => onProgress?.({ what, doneBytes, totalBytes });
  const files = await readFiles(found, tools, container, ({ path, doneBytes, totalBytes }) => say(path, doneBytes, totalBytes), signal);
  for (const { place, sentence, expected, found: is } of archiveFaults) container.fault(place, sentence, expected, is);
  const bytes = [...files.values()].reduce((sum, file) => sum + file.sizeBytes, 0);
  const steps: Step[] = [container.done(source === "archive"
    ? `${files.size} files, ${sizeText(bytes)}, all in the one folder ${folder}; each has the CRC-32 that the archive gives for it.`
    : `${files.size} files, ${sizeText(bytes)}; no link, no name that leads elsewhere.`)];
  if (files.size === 0) {
    const facts = { folder, caseRef: null, files: 0, bytes: 0, entries: 0, logKey: null, sealKey: null, seal: null, heads: [] };
    return { ...verdictOf(steps, facts), steps, facts };
  }
  steps.push(checkDeclaration(files), checkCount(files), checkManifest(files), checkTagManifest(files), checkTagSignature(files, tools));
  const { ring, step: keys } = await checkKeys(files, tools);
  steps.push(keys);
  const logs: DriveLog[] = [];
  for (const drive of drivesIn(files)) {
    signal?.throwIfAborted();
    const { step, log } = await checkLog(files, drive, ring, tools, (n) => {
      say(`the custody log of drive ${drive}, entry ${n}`, bytes, bytes);
      signal?.throwIfAborted();
    });
    steps.push(step);
    if (log) logs.push(log);
  }
  signal?.throwIfAborted();
  steps.push(checkDrives(files, logs));
  const record = checkRecord(files, logs);
  const { step: seal, seen } = checkSeal(files, ring, tools);
  const logKey = logKeyOf(files, tools)?.id ?? null;
  steps.push(record.step, seal, checkProof(files, seen, logs, tools), checkFingerprint(expectedKey, logKey, seen.keyId, ring));
  const facts: BundleFacts = {
    folder, caseRef: record.ref, files: files.size, bytes, entries: logs.reduce((sum, log) => sum + log.entries.length, 0), logKey, sealKey: seen.keyId,
    seal: seen.facts && { number: seen.facts.number, at: seen.facts.at }, heads: logs.map(({ drive, head }) => ({ drive, ...head })),
  };
  return { ...verdictOf(steps, facts), steps, facts };
}

/** The drives' folders count from 1 without a gap, and no two hold the same log. */
function checkDrives(files: Files, logs: readonly DriveLog[]): Step {
  const notes = new StepNotes("drives", "The drives");
  const numbers = drivesIn(files);
  if (numbers.length === 0) notes.fault("data/drives", "There is no drive in this bundle.");
  numbers.forEach((number, i) => {
    if (number !== i + 1) notes.fault(`data/drives/${number}`, "The drives are not counted from 1 without a gap.", String(i + 1), String(number));
  });
  for (const path of files.keys()) if (path.startsWith("data/drives/") && !/^data\/drives\/[1-9]\d{0,4}\//.test(path)) notes.fault(path, "It lies in no drive's folder.");
  for (const log of logs) {
    const other = logs.find((one) => one.drive < log.drive && one.chain === log.chain);
    if (other) notes.fault(`data/drives/${log.drive}`, `It has the custody log of drive ${other.drive}.`);
  }
  return notes.done(`${numbers.length === 1 ? "1 drive" : `${numbers.length} drives`}, each with a custody log of its own.`);
}
