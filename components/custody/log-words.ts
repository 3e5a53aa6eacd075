import { entriesText } from "./entries-text";
import type { CustodyCheckView, CustodyEntryView } from "@/lib/views";

export type LogKind = "all" | "reads" | "findings" | "signatures";
export const LOG_KINDS: readonly { key: LogKind; label: string }[] = [
  { key: "all", label: "All" }, { key: "reads", label: "Reads" }, { key: "findings", label: "Differed" }, { key: "signatures", label: "Signatures" },
];

export function ofKind(entry: CustodyEntryView, kind: LogKind): boolean {
  if (kind === "reads") return entry.action.startsWith("read.") || entry.action.startsWith("readback.") || entry.action.startsWith("composite.");
  if (kind === "findings") return entry.kind === "differs";
  if (kind === "signatures") return entry.kind === "signed";
  return true;
}

/** Groups of steps, by the first word of the action; what none of them takes is "other". */
const GROUPS: readonly { key: string; label: string; takes: RegExp }[] = [
  { key: "records", label: "Drive, boards and chips", takes: /^(case|request|parcel|photo|note|shelf|drive|board|chip)\./ },
  { key: "reads", label: "Reads", takes: /^(read|composite)\./ },
  { key: "approvals", label: "Approvals", takes: /^approval\./ },
  { key: "transfers", label: "Transfers and read-backs", takes: /^(transfer|readback|start-up)\./ },
  { key: "images", label: "Stored images", takes: /^images?\.(found|second|checked|erased)/ },
  { key: "outside", label: "Hand-outs, bundles, summaries", takes: /^(image\.handed-out|bundle\.|summary\.|share\.)/ },
  { key: "items", label: "Hand-overs of items", takes: /^item\./ },
  { key: "accounts", label: "Accounts and tokens", takes: /^(user|token|sign-in)\./ },
  { key: "rules", label: "Policy, keys and seals", takes: /^(policy|key|seal)\./ },
  { key: "assessments", label: "Assessments", takes: /^log\.assessed$/ },
];

export function groupOf(action: string): string {
  return GROUPS.find((group) => group.takes.test(action))?.key ?? "other";
}

/** The groups that a log has entries of, with how many. */
export function groupsIn(entries: readonly CustodyEntryView[]): { key: string; label: string; count: number }[] {
  return [...GROUPS, { key: "other", label: "Other" }].map(({ key, label }) => ({ key, label, count: entries.filter((entry) => groupOf(entry.action) === key).length })).filter((group) => group.count > 0);
}

export interface LogFilter {
  kind: LogKind;
  group: string;
  who: string;
  where: string;
  words: string;
}

export const WHOLE_LOG: LogFilter = { kind: "all", group: "", who: "", where: "", words: "" };

/** The filter as words of an address; empty for the whole log. */
export function filterQuery(filter: LogFilter): string {
  return new URLSearchParams(Object.entries(filter).filter(([key, value]) => value !== WHOLE_LOG[key as keyof LogFilter])).toString();
}

/** The filter of an address; words that make no sense there are left out. */
export function filterOf(query: URLSearchParams): LogFilter {
  const word = (key: keyof LogFilter) => (query.get(key) ?? "").slice(0, 200);
  return { kind: LOG_KINDS.find(({ key }) => key === word("kind"))?.key ?? "all", group: word("group"), who: word("who"), where: word("where"), words: word("words") };
}

/** Every word typed has to be found somewhere in the entry, in any case. */
export function keeps(entry: CustodyEntryView, { kind, group, who, where, words }: LogFilter): boolean {
  if (!ofKind(entry, kind) || (group && groupOf(entry.action) !== group) || (who && entry.actor.name !== who) || (where && entry.where !== where)) return false;
  const text = `${entry.sentence} ${entry.action} ${entry.actor.name} ${entry.where} ${entry.hash} ${entry.body}`.toLowerCase();
  return words.toLowerCase().split(/\s+/).every((word) => text.includes(word));
}

/** The hash of the entry before, as the body states it; null when the body can't be read. */
export function prevOf(entry: CustodyEntryView): string | null {
  try {
    const body: unknown = JSON.parse(entry.body);
    const prev = typeof body === "object" && body !== null && "prev" in body ? body.prev : null;
    return typeof prev === "string" ? prev : null;
  } catch {
    return null;
  }
}

/** What is said in the gap between two neighbours of the whole chain; null while the later one links to the earlier. */
export function gapBetween(earlier: CustodyEntryView | null, later: CustodyEntryView): string | null {
  const expected = (earlier?.seq ?? 0) + 1;
  if (later.seq > expected) {
    const missing = later.seq - expected;
    return missing === 1 ? `Entry ${expected} is missing here.` : `Entries ${expected} to ${later.seq - 1} are missing here.`;
  }
  const prev = prevOf(later);
  if (prev === null) return `Entry ${later.seq} doesn't name the one before: the chain is broken here.`;
  if (earlier && prev !== earlier.hash) return `Entry ${later.seq} doesn't link to entry ${earlier.seq}: the chain is broken here.`;
  if (!earlier && !/^0{64}$/.test(prev)) return "The first entry names one before it: the beginning is missing.";
  return null;
}

/** For each entry whose link to the one before is broken, what is wrong, by its number. */
export function gapsOf(oldestFirst: readonly CustodyEntryView[]): Map<number, string> {
  const gaps = new Map<number, string>();
  oldestFirst.forEach((entry, i) => {
    const gap = gapBetween(oldestFirst[i - 1] ?? null, entry);
    if (gap) gaps.set(entry.seq, gap);
  });
  return gaps;
}

type CheckFinding = CustodyCheckView["findings"][number];

const PROBLEM: Record<string, string> = {
  "not-readable": "can't be read as text: its bytes were changed",
  "not-canonical": "is not written in the fixed form: it was changed or written by something else",
  "wrong-shape": "lacks something that every entry holds, or holds something that doesn't belong",
  "other-chain": "belongs to another log",
  sequence: "has a number that doesn't follow: an entry was taken out, put in or moved",
  "time-went-back": "is dated before the entry in front of it",
  prev: "doesn't carry the hash of the entry before: that one, or this one, was changed",
  "stored-hash": "doesn't give the hash that is stored beside it: its text was changed",
  "unknown-key": "is signed with a key that this workshop never introduced",
  "old-key": "is signed with a key that had been replaced by then: whoever kept the former key may have written it",
  signature: "has a signature that doesn't fit its text: it was changed, or not written by Twinread",
  "could-not-check": "could not be checked",
};

/** One finding of the check in plain words. */
export function problemWords({ seq, problem, expected, found }: CheckFinding): string {
  if (problem === "head-was-behind") return "When this entry was written, somebody had turned the log's head back behind entries that were there.";
  if (problem === "tail-missing") return `The end of the log is cut off: ${expected ?? "more entries"} should be there, ${found ?? "fewer"} are.`;
  if (problem === "head") return "The head beside the log doesn't name its last entry: entries were added or taken away without Twinread.";
  const words = PROBLEM[problem] ?? `doesn't pass the check (${problem})`;
  return seq === null ? `The log ${words}.` : `Entry ${seq} ${words}.`;
}

/** The verdict's sentence and why. */
export function checkWords(check: CustodyCheckView): { sentence: string; why: string } {
  if (check.ok && check.entries === 0) return { sentence: "This log has no entry yet.", why: "The first step recorded begins it." };
  if (check.ok) {
    return {
      sentence: check.entries === 1 ? "The one entry is sound. Nothing was changed, removed or put in between." : `All ${entriesText(check.entries)} link. Nothing was changed, removed or put in between.`,
      why: "Each hash was computed again from its entry and compared with the one that the next entry carries; each signature was checked with the workshop's key. A cut end shows only against a bundle, a summary or a mail that left the house.",
    };
  }
  const n = check.findings.length;
  return {
    sentence: `${n === 1 ? "One finding stands" : `${n} findings stand`} against this log. Have an auditor look at it.`,
    why: "Approvals, hand-outs and transfers of this drive wait until an auditor has recorded an assessment. New entries are still written. Nothing was repaired.",
  };
}
