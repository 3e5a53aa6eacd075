import type { Actor } from "./words";

/**
 * Who may do what: the one list (PRODUCT.md, "Who uses it"). Asked in the command or query right after loading,
 * and by the pages to hide a button. Rules that need facts of the thing (the two-person rule, "own" reads)
 * take them as `thing`.
 */
const STAFF = ["technician", "lead", "auditor", "admin"] as const;
const BENCH = ["technician", "lead"] as const;

const RULES = {
  "case.read": STAFF,
  "case.create": BENCH,
  "case.close": ["lead"],
  "drive.record": BENCH,
  "board.record": BENCH,
  "board.allow-other-number": ["lead"],
  "chip.record": BENCH,
  "fact.correct": BENCH,
  "read.store": BENCH,
  "read.bytes": STAFF,
  "read.set-aside": BENCH,
  "read.hand-out-approved": ["technician", "lead", "auditor"],
  "read.hand-out-any": ["lead", "auditor"],
  "composite.make": ["lead"],
  "approval.ask": BENCH,
  "approval.give": ["lead"],
  "approval.send-back": ["lead"],
  "approval.revoke": ["lead"],
  "transfer.record": BENCH,
  "custody.read": STAFF,
  "workshop-log.read": ["lead", "auditor", "admin"],
  "bundle.make": ["auditor", "lead"],
  "summary.send": ["lead"],
  "share.withdraw": ["lead"],
  "find.ask": STAFF,
  "policy.read": STAFF,
  "policy.change": ["admin"],
  "user.manage": ["admin"],
  "outbox.read": ["admin"],
  "assessment.record": ["auditor"],
  "audit.read": ["auditor", "lead", "admin"],
  "seal.make": ["auditor", "lead", "admin"],
  "key.change": ["admin"],
  "parcel.receive": BENCH,
  "photo.add": BENCH,
  "photo.read": STAFF,
  "shelf.read": STAFF,
  "shelf.change": BENCH,
  "case.hold": BENCH,
  "note.add": BENCH,
  "start-up.record": BENCH,
  "case.return": BENCH,
  "case.release": ["lead"],
  "case.erase": ["lead", "admin"],
  "request.answer": ["lead", "admin"],
  "item.hand-over": BENCH,
  "item.confirm": BENCH,
} as const satisfies Record<string, readonly string[]>;

export type Verb = keyof typeof RULES;
export const VERBS = Object.keys(RULES) as Verb[];

/** What belongs to the workshop as a whole: for an auditor whose account carries a case list it isn't there at all. */
const WORKSHOP_WIDE: ReadonlySet<Verb> = new Set<Verb>(["workshop-log.read", "user.manage", "outbox.read", "seal.make", "key.change", "shelf.read", "shelf.change"]);

type Asker = Pick<Actor, "id" | "role" | "cases">;

/** True when this is hidden from the actor like something that never was, rather than refused. */
export function isHidden(actor: Asker, verb: Verb): boolean {
  return actor.cases !== undefined && WORKSHOP_WIDE.has(verb);
}

export interface Thing {
  /** for read.set-aside: who took the read */
  operatorId?: string;
}

export function may(actor: Asker, verb: Verb, thing: Thing = {}): boolean {
  if (isHidden(actor, verb)) return false;
  if (!(RULES[verb] as readonly string[]).includes(actor.role)) return false;
  if (verb === "read.set-aside" && actor.role === "technician") return thing.operatorId === actor.id;
  return true;
}
