import { ACTIONS, type Action, describe, type EntryKind } from "./custody-actions";
import { readName, type Stage } from "./words";

/** What the audit pages list. Each name is one table, one address and one file. */
export const AUDIT_LISTS = ["drives", "images", "hand-outs", "refusals", "sessions", "tokens", "limits", "assessments", "clock", "seals"] as const;
export type AuditList = (typeof AUDIT_LISTS)[number];

/** Lists of what stands in the logs, by the actions that they take from it; the clock's takes all. */
export const ENTRY_LISTS = {
  "hand-outs": ["image.handed-out", "bundle.started", "bundle.completed", "summary.sent", "summary.opened", "share.withdrawn"],
  refusals: ["approval.refused", "approval.sent-back", "approval.revoked"],
  limits: ["sign-in.limited"],
  assessments: ["log.assessed"],
  clock: [],
} as const satisfies Partial<Record<AuditList, readonly Action[]>>;
export type EntryList = keyof typeof ENTRY_LISTS;

/** About the workshop as a whole: not there for an auditor who sees certain cases only. */
export const WORKSHOP_LISTS: readonly AuditList[] = ["sessions", "tokens", "limits"];

const ACTION_WORD: Partial<Record<Action, string>> = {
  "image.handed-out": "Image handed out", "bundle.started": "Bundle started", "bundle.completed": "Bundle completed", "summary.sent": "Summary sent",
  "summary.opened": "Summary opened", "share.withdrawn": "Link withdrawn", "approval.refused": "Refused by a rule", "approval.sent-back": "Sent back",
  "approval.revoked": "Revoked", "sign-in.limited": "Sign-ins refused", "log.assessed": "Log assessed",
};

/** "Image handed out"; an action without a word of its own keeps its code. */
export function actionWord(action: string): string {
  return ACTION_WORD[action as Action] ?? action;
}

/** What an entry's body says, taken from bytes that may be anything. */
export interface EntryReading {
  /** RFC 3339 in UTC; empty when the body does not say */
  at: string;
  who: string;
  role: string;
  action: string;
  sentence: string;
  kind: EntryKind;
  /** the thing concerned: "Read 1 of U12" */
  what: string;
  /** SHA-256 that leaves, is refused or falls; empty when there is none */
  digest: string;
  to: string;
  /** reason, rule or text, as it was written */
  reason: string;
  clockBehindMs: number | null;
  headBehind: number | null;
  /** why the entry can't be taken at its word; null when it can */
  trouble: string | null;
}

type Bag = Record<string, unknown>;
const bag = (value: unknown): Bag => (typeof value === "object" && value !== null && !Array.isArray(value) ? (value as Bag) : {});
const text = (value: unknown): string => (typeof value === "string" ? value : "");
const whole = (value: unknown): number | null => (typeof value === "number" && Number.isSafeInteger(value) ? value : null);
const AT = /^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}:\d{2}(\.\d{1,6})?Z$/;

const UNREADABLE = { at: "", who: "", role: "", kind: "differs", what: "", digest: "", to: "", reason: "", clockBehindMs: null, headBehind: null } as const;

/**
 * Reads a body as hostile input: nothing thrown, nothing believed that has another shape. `column` is the action that the
 * row beside the body names; where they differ the body counts, because it is what was signed.
 */
export function readEntry(body: string, column: string): EntryReading {
  let parsed: Bag;
  try {
    parsed = bag(JSON.parse(body));
  } catch {
    return { ...UNREADABLE, action: column, sentence: "This entry can't be read: its body is damaged.", trouble: "The body can't be read." };
  }
  const actor = bag(parsed.actor);
  const facts = bag(parsed.facts);
  const action = text(parsed.action);
  const at = text(parsed.at);
  const time = AT.test(at) && !Number.isNaN(Date.parse(at)) ? at : "";
  const known = Object.hasOwn(ACTIONS, action) && ACTIONS[action as Action].facts.safeParse(facts).success;
  const trouble = action !== column ? `The row beside it says ${column}, the signed body says ${action || "nothing"}.`
    : !known ? "Its facts have another shape than this version of Twinread writes." : time === "" ? "It carries no time that can be read." : text(actor.name) === "" ? "It names nobody who did it." : null;
  return {
    at: time, who: text(actor.name), role: text(actor.role), action: action || column, ...(known ? describe(action, facts) : { sentence: action || column, kind: "differs" as const }),
    ...(known ? details(action, facts) : { what: "", digest: "", to: "", reason: "" }),
    clockBehindMs: whole(facts.clockBehindMs), headBehind: whole(facts.headBehind), trouble,
  };
}

function details(action: string, facts: Bag): Pick<EntryReading, "what" | "digest" | "to" | "reason"> {
  const read = bag(facts.read);
  const chip = text(bag(facts.chip).designator);
  const ofRead = read.stage ? readName(read.stage as Stage, whole(read.number) ?? 0) : "";
  const what = ofRead ? `${ofRead}${chip ? ` of ${chip}` : ""}` : action.startsWith("bundle.") ? "Case bundle" : action.startsWith("summary.") || action.startsWith("share.") ? "Summary" : action === "sign-in.limited" ? text(facts.address) : chip;
  return {
    what, digest: text(facts.sha256) || text(facts.tagManifestSha256) || text(facts.accountDigest),
    to: text(bag(facts.to).name) || (action.startsWith("summary.") ? "the customer" : ""),
    reason: text(facts.reason) || text(facts.rule) || text(facts.text) || (action === "image.handed-out" ? text(facts.purpose) : ""),
  };
}

export type SessionEnd = "open" | "idle" | "whole" | "ended";
export const END_WORD: Record<SessionEnd, string> = { open: "open", idle: "ran out: 30 minutes without a step", whole: "ran out: 8 hours were over", ended: "signed out, or ended by hand" };

/** How a session came to its end, from its times alone; seconds of the two limits are given. */
export function sessionEnd(session: { createdAt: Date; lastSeenAt: Date; endedAt: Date | null }, now: Date, idleSeconds: number, absoluteSeconds: number): SessionEnd {
  const at = session.endedAt ?? now;
  const idle = at.getTime() - session.lastSeenAt.getTime() > idleSeconds * 1000;
  const old = at.getTime() - session.createdAt.getTime() > absoluteSeconds * 1000;
  if (old) return "whole";
  if (idle) return "idle";
  return session.endedAt ? "ended" : "open";
}

/** Milliseconds by which the database's clock is ahead of the app's, and how well that is known (half the round trip). */
export interface ClockReading {
  offsetMs: number;
  withinMs: number;
}

/** One try: `sent` and `got` by the app's clock, `said` by the database's, all in milliseconds since 1970. */
export function clockOffset(tries: readonly { sent: number; said: number; got: number }[]): ClockReading | null {
  const [best] = [...tries].sort((a, b) => a.got - a.sent - (b.got - b.sent));
  return best ? { offsetMs: best.said - (best.sent + best.got) / 2, withinMs: (best.got - best.sent) / 2 } : null;
}

/** First instant of a calendar day ("2026-03-12") in a time zone, as RFC 3339 in UTC with six decimals. `days` later. */
export function dayStart(day: string, timeZone: string, days = 0): string {
  const wall = Date.parse(`${day}T00:00:00Z`) + days * 86_400_000;
  let instant = wall;
  // the zone's offset may change between the guess and the day's first instant: twice is enough
  for (let i = 0; i < 2; i += 1) instant = wall - offsetAt(instant, timeZone);
  return new Date(instant).toISOString().replace(/\.(\d{3})Z$/, ".$1000Z");
}

function offsetAt(instant: number, timeZone: string): number {
  const parts = new Intl.DateTimeFormat("en-GB", { timeZone, hourCycle: "h23", year: "numeric", month: "2-digit", day: "2-digit", hour: "2-digit", minute: "2-digit", second: "2-digit" }).formatToParts(new Date(instant));
  const of = (type: string) => Number(parts.find((part) => part.type === type)?.value ?? 0);
  return Date.UTC(of("year"), of("month") - 1, of("day"), of("hour"), of("minute"), of("second")) - Math.floor(instant / 1000) * 1000;
}
