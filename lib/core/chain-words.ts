import type { ChainFinding, ChainProblem } from "./custody";

/** What the check of a chain found, one plain sentence each, for mails, reports and the audit pages. */
export const CHAIN_PROBLEMS: Record<ChainProblem, string> = {
  "not-readable": "The entry cannot be read.",
  "not-canonical": "The entry's text is not in its canonical form: it was written by something else.",
  "wrong-shape": "The entry does not have the parts that an entry has.",
  "other-chain": "The entry belongs to another log.",
  sequence: "The entry's number does not follow the one before.",
  "time-went-back": "The entry claims a time before the one before it.",
  prev: "The entry does not continue the one before it: one of the two was changed, or one is missing.",
  "stored-hash": "The entry is not the one whose digest was stored: it was changed.",
  "stored-beside": "The entry stands in the database under another number, kind or link than it names itself.",
  "unknown-key": "The entry is signed with a key that no log introduces.",
  "old-key": "The entry is signed with a key that had been replaced: whoever kept it may have written this.",
  signature: "The signature does not fit the entry: it was changed, or somebody else wrote it.",
  head: "The log's head does not stand at its last entry.",
  "head-was-behind": "The log's head had been turned back when this entry was written.",
  "tail-missing": "The log ends before its head: entries at the end are missing.",
  "could-not-check": "The entry could not be checked.",
};

/** "Entry 12: The signature does not fit the entry: …" */
export function chainFindingSentence({ seq, problem }: Pick<ChainFinding, "seq" | "problem">): string {
  return seq === null ? CHAIN_PROBLEMS[problem] : `Entry ${seq}: ${CHAIN_PROBLEMS[problem]}`;
}
