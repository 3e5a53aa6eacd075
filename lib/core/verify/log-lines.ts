import type { ChainLine } from "../custody";
import { entriesText, type StepNotes } from "./report";
import type { ReadFile } from "./read-files";

export interface LogLine extends ChainLine {
  /** the signature's 64 bytes */
  bytes: Uint8Array;
}

const MOST_ENTRIES = 500_000;
const NEWLINE = 0x0a;
const SIGNATURE = /^([0-9a-f]{64}) ([A-Za-z0-9+/]{86}==)$/;

/** The lines of a file without their newlines, as bytes: a view, no copy. */
function linesOf(bytes: Uint8Array): Uint8Array[] {
  const lines: Uint8Array[] = [];
  for (let from = 0; from < bytes.length; ) {
    const end = bytes.indexOf(NEWLINE, from);
    lines.push(bytes.subarray(from, end < 0 ? bytes.length : end));
    if (end < 0) break;
    from = end + 1;
  }
  return lines;
}

/** Entries and signatures of `<path>.jsonl` and `<path>.sig`, side by side. What is off is noted; entries without a signature get an empty one. */
export function readLog(files: ReadonlyMap<string, ReadFile>, path: string, notes: StepNotes): LogLine[] {
  const [log, signatures] = [files.get(`${path}.jsonl`)?.bytes, files.get(`${path}.sig`)?.bytes];
  if (!log) notes.fault(`${path}.jsonl`, "It is missing.");
  if (!signatures) notes.fault(`${path}.sig`, "It is missing.");
  if (!log || !signatures) return [];
  if (log.length === 0) notes.fault(`${path}.jsonl`, "It is empty.");
  for (const [name, bytes] of [[`${path}.jsonl`, log], [`${path}.sig`, signatures]] as const) {
    if (bytes.length > 0 && bytes[bytes.length - 1] !== NEWLINE) notes.fault(name, "It does not end with a whole line.");
  }
  const bodies = linesOf(log);
  const signed = linesOf(signatures).map((line) => SIGNATURE.exec(new TextDecoder("latin1").decode(line)));
  if (bodies.length > MOST_ENTRIES) {
    notes.fault(`${path}.jsonl`, "It has more entries than this check takes.", `${MOST_ENTRIES} at most`, String(bodies.length));
    return [];
  }
  if (signed.length !== bodies.length) notes.fault(`${path}.sig`, "It does not have one signature for each entry.", entriesText(bodies.length), String(signed.length));
  signed.forEach((line, i) => {
    if (!line) notes.fault(`${path}.sig, line ${i + 1}`, "It is not a key id, a space and a signature.");
  });
  return bodies.map((body, i) => {
    const [, keyId = "", signature = ""] = signed[i] ?? [];
    return { body, keyId, signature, bytes: Uint8Array.from(atob(signature), (character) => character.charCodeAt(0)) };
  });
}
