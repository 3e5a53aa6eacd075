import { z } from "zod";
import { CASE_JSON } from "../bundle-layout";
import { countOf } from "../quantity";
import type { Files } from "./lists";
import type { DriveLog } from "./log";
import { textOf } from "./read-files";
import { type Step, StepNotes } from "./report";

/** As much of case.json as a log can speak to; the rest is for people. */
const approval = z.object({ id: z.string(), sha256: z.string(), revoked: z.unknown() });
const read = z.object({ id: z.string(), path: z.string(), sha256: z.string(), stage: z.string(), number: z.number() });
const chip = z.object({ reads: z.array(read), approvals: z.array(approval) });
const drive = z.object({ number: z.number(), id: z.string(), logUpTo: z.object({ seq: z.number(), hash: z.string() }), boards: z.array(z.object({ chips: z.array(chip) })) });
const record = z.object({ ref: z.string(), drives: z.array(drive) });

const PLACE = CASE_JSON;
const text = (value: unknown) => (typeof value === "string" ? value : "");

/** The case as recorded says the same as the logs: which drives, how far, which reads with which digests, which approvals. */
export function checkRecord(files: Files, logs: readonly DriveLog[]): { step: Step; ref: string | null } {
  const notes = new StepNotes("record", "The case as recorded");
  const source = textOf(files, CASE_JSON);
  if (source === null) {
    notes.fault(PLACE, files.has(CASE_JSON) ? "It is not text in UTF-8." : "It is missing.");
    return { step: notes.done(""), ref: null };
  }
  const parsed = record.safeParse(jsonOf(source));
  if (!parsed.success) {
    notes.fault(PLACE, "It is not the record of a case.", undefined, parsed.error.issues[0]?.message);
    return { step: notes.done(""), ref: null };
  }
  const { ref, drives } = parsed.data;
  if (drives.length !== logs.length) notes.fault(PLACE, "It has another number of drives than the bundle has logs.", String(logs.length), String(drives.length));
  for (const log of logs) {
    const said = drives.find((one) => one.number === log.drive);
    if (!said) notes.fault(PLACE, `It says nothing of drive ${log.drive}.`);
    else compareDrive(said, log, ref, files, notes);
  }
  const reads = drives.flatMap((one) => one.boards.flatMap((b) => b.chips.flatMap((c) => c.reads)));
  return { step: notes.done(`case.json and the logs say the same of ${countOf(drives.length, "drive")}, ${countOf(reads.length, "read")} and their approvals.`), ref };
}

function jsonOf(source: string): unknown {
  try {
    return JSON.parse(source);
  } catch {
    return null;
  }
}

function compareDrive(said: z.infer<typeof drive>, log: DriveLog, ref: string, files: Files, notes: StepNotes): void {
  const where = `${PLACE}, drive ${log.drive}`;
  if (said.id !== log.chain) notes.fault(where, "The log beside it is that of another drive.", said.id, log.chain);
  if (said.logUpTo.seq !== log.head.seq || said.logUpTo.hash !== log.head.hash) notes.fault(where, "The log ends elsewhere than it says.", `entry ${said.logUpTo.seq}, ${said.logUpTo.hash}`, `entry ${log.head.seq}, ${log.head.hash}`);
  const started = log.entries.at(-1)?.facts.caseRef;
  if (started !== ref) notes.fault(where, "The log's last entry starts a bundle of another case.", ref, text(started));
  const reads = said.boards.flatMap((b) => b.chips.flatMap((c) => c.reads));
  const logged = new Map(log.entries.filter(({ action }) => action === "read.stored" || action === "composite.made").map((entry) => [entry.subject, text(entry.facts.sha256)]));
  same("read", new Map(reads.map((one) => [one.id, one.sha256])), logged, where, notes);
  for (const one of reads) {
    const file = files.get(one.path);
    if (!file && log.erased.has(one.sha256)) continue;
    if (file?.sha256 !== one.sha256) notes.fault(one.path, "It is not the image that case.json gives for this read.", one.sha256, file?.sha256 ?? "no such file");
  }
  const approvals = said.boards.flatMap((b) => b.chips.flatMap((c) => c.approvals));
  const given = new Map(log.entries.filter(({ action }) => action === "approval.given").map((entry) => [entry.subject, text(entry.facts.sha256)]));
  same("approval", new Map(approvals.map((one) => [one.id, one.sha256])), given, where, notes);
  const revoked = new Set(log.entries.filter(({ action }) => action === "approval.revoked").map((entry) => entry.subject));
  for (const one of approvals) {
    const stands = one.revoked === null;
    if (stands === revoked.has(one.id)) notes.fault(where, stands ? "An approval stands in it that the log revokes." : "An approval is revoked in it that the log never revokes.", undefined, one.id);
  }
}

function same(noun: string, said: ReadonlyMap<string, string>, logged: ReadonlyMap<string, string>, where: string, notes: StepNotes): void {
  for (const [id, sha256] of said) {
    if (!logged.has(id)) notes.fault(where, `It has ${noun === "read" ? "a read" : "an approval"} that the log does not have.`, undefined, id);
    else if (logged.get(id) !== sha256) notes.fault(where, `It gives another digest for ${noun} ${id} than the log.`, logged.get(id), sha256);
  }
  for (const id of logged.keys()) if (!said.has(id)) notes.fault(where, `It leaves out ${noun === "read" ? "a read" : "an approval"} that the log has.`, id);
}
