import type { CustodyEntry } from "@/models";

/** What one entry says was done: where it stands, who did it, and its facts. Hostile input: each part may be missing. */
export interface Told {
  chain: string;
  seq: number;
  by: string;
  action: string;
  facts: Record<string, unknown>;
}

export interface LoggedRead {
  chain: string;
  seq: number;
  sha256: string;
  sizeBytes: number;
  crc32: string;
}

export interface LoggedApproval {
  chain: string;
  seq: number;
  sha256: string;
}

/** What the logs say of the rows: the facts that a row must agree with. */
export interface Logged {
  reads: Map<string, LoggedRead>;
  approvals: Map<string, LoggedApproval>;
  /** ids of revoked approvals */
  revoked: Set<string>;
  /** the entries themselves, by the id of what they are about */
  told: { reads: Map<string, Told>; counts: Map<string, Told>; approvals: Map<string, Told>; revocations: Map<string, Told>; transfers: Map<string, Told>; photos: Map<string, Told>; handOvers: Map<string, Told>; confirmations: Map<string, Told>; shares: Map<string, Told>; withdrawals: Map<string, Told>; erasures: Map<string, Told>; wishes: Map<string, Told>; answers: Map<string, Told> };
  /** accounts by id, as their entries leave them */
  users: Map<string, { seq: number; name: string; role: string; off: boolean }>;
  /** drives, boards and chips by id, as their entries leave them: plain values by the name of their column */
  things: Map<string, { chain: string; seq: number; noun: string; facts: Record<string, unknown> }>;
  /** of each donor's chip: the original's chip that it is paired with */
  pairs: Map<string, string | null>;
  /** of each log: its last word on the images that it says were erased, by their digest */
  erased: Map<string, Map<string, { seq: number; stands: boolean }>>;
  /** cases by id, as their entries leave what decides about an erasure */
  cases: Map<string, { chain: string; seq: number; eraseOn: string | null; keptUntil: string | null }>;
  /** fields of the policy that an entry has changed, as the last one leaves them */
  policy: Map<string, { seq: number; value: unknown }>;
}

export function newLogged(): Logged {
  return {
    reads: new Map(), approvals: new Map(), revoked: new Set(), users: new Map(), policy: new Map(), things: new Map(), pairs: new Map(), erased: new Map(), cases: new Map(),
    told: { reads: new Map(), counts: new Map(), approvals: new Map(), revocations: new Map(), transfers: new Map(), photos: new Map(), handOvers: new Map(), confirmations: new Map(), shares: new Map(), withdrawals: new Map(), erasures: new Map(), wishes: new Map(), answers: new Map() },
  };
}

interface Body {
  action: string;
  actor: { id: string };
  subject: { id: string };
  facts: Record<string, unknown>;
}

type Noter = (logged: Logged, id: string, told: Told) => void;

const storedRead: Noter = (logged, id, told) => {
  const { sha256, sizeBytes, crc32 } = told.facts as unknown as LoggedRead;
  logged.reads.set(id, { chain: told.chain, seq: told.seq, sha256, sizeBytes, crc32 });
  logged.told.reads.set(id, told);
};
const confirmed: Noter = (logged, _, told) => void logged.told.confirmations.set(String(told.facts.handOver), told);
const count: Noter = (logged, id, told) => void logged.told.counts.set(id, told);

function changedUser(logged: Logged, id: string, told: Told): void {
  const user = logged.users.get(id);
  if (!user || !Array.isArray(told.facts.changes)) return;
  for (const { field, to } of told.facts.changes as { field: string; to: unknown }[]) {
    if (field === "name" || field === "role") user[field] = String(to);
    if (field === "switched off") user.off = to === true;
  }
  user.seq = told.seq;
}

const plain = (facts: Record<string, unknown>) => Object.fromEntries(Object.entries(facts).filter(([, value]) => value === null || typeof value !== "object"));

function recorded(logged: Logged, id: string, { chain, seq, action, facts }: Told): void {
  const designator = (facts.chip as { designator?: unknown } | undefined)?.designator;
  logged.things.set(id, { chain, seq, noun: action.split(".")[0], facts: { ...plain(facts), ...(designator === undefined ? {} : { designator }) } });
}

function corrected(logged: Logged, id: string, told: Told): void {
  const thing = logged.things.get(id);
  for (const { field, to } of told.facts.changes as { field: string; to: unknown }[]) {
    if (field === "pairedWith") logged.pairs.set(id, to === null ? null : logged.pairs.get(id) ?? null);
    else if (thing) thing.facts[field] = to;
  }
  if (thing) thing.seq = told.seq;
}

function paired(logged: Logged, id: string, { facts }: Told): void {
  const { donorChip, before } = facts as { donorChip: { id: string }; before: { id: string } | null };
  if (before) logged.pairs.set(before.id, null);
  logged.pairs.set(donorChip.id, id);
}

const lastWord = (stands: boolean): Noter => (logged, _, { chain, seq, facts }) => {
  const words = logged.erased.get(chain) ?? new Map<string, { seq: number; stands: boolean }>();
  logged.erased.set(chain, words);
  // one that was found sound again says nothing of an erasure unless there was one
  if (stands || words.has(String(facts.sha256))) words.set(String(facts.sha256), { seq, stands });
};

/** What the entries of a case leave of the day and of the keeping; each of its logs says the same. */
const days = (change: (facts: Record<string, unknown>) => Partial<{ eraseOn: string | null; keptUntil: string | null }>): Noter => (logged, id, { chain, seq, facts }) => {
  logged.cases.set(id, { eraseOn: null, keptUntil: null, ...logged.cases.get(id), chain, seq, ...change(facts) });
};
const day = (value: unknown) => (typeof value === "string" ? value : null);

const NOTED: Record<string, Noter> = {
  "read.stored": storedRead,
  "read.set-aside": count,
  "read.counted-again": count,
  "approval.given": (logged, id, told) => {
    logged.approvals.set(id, { chain: told.chain, seq: told.seq, sha256: String(told.facts.sha256) });
    logged.told.approvals.set(id, told);
  },
  "approval.revoked": (logged, id, told) => {
    logged.revoked.add(id);
    logged.told.revocations.set(id, told);
  },
  "composite.made": storedRead,
  "transfer.recorded": (logged, id, told) => void logged.told.transfers.set(id, told),
  "photo.added": (logged, id, told) => void logged.told.photos.set(id, told),
  // their subject is the item
  "item.handed-over": (logged, _, told) => void logged.told.handOvers.set(String(told.facts.handOver), told),
  "item.received": confirmed,
  "item.not-received": confirmed,
  "summary.sent": (logged, id, told) => void logged.told.shares.set(id, told),
  "share.withdrawn": (logged, id, told) => void logged.told.withdrawals.set(id, told),
  "image.erased": lastWord(true),
  "image.found-sound": lastWord(false),
  "case.erased": (logged, _, told) => void logged.told.erasures.set(String(told.facts.erasure), told),
  "case.closed": days((facts) => ({ eraseOn: day(facts.eraseOn) })),
  "case.reopened": days(() => ({ eraseOn: null })),
  "case.kept-longer": days((facts) => ({ keptUntil: day(facts.until) })),
  "request.deletion-asked": (logged, id, told) => void logged.told.wishes.set(id, told),
  "request.deletion-answered": (logged, id, told) => void logged.told.answers.set(id, told),
  "drive.recorded": recorded,
  "board.recorded": recorded,
  "chip.recorded": recorded,
  "drive.corrected": corrected,
  "board.corrected": corrected,
  "chip.corrected": corrected,
  "chip.paired": paired,
  "user.created": (logged, id, told) => {
    const { user, role } = told.facts as { user: { name: string }; role: string };
    logged.users.set(id, { seq: told.seq, name: user.name, role, off: false });
  },
  "user.changed": changedUser,
  "policy.changed": (logged, _, told) => {
    for (const { field, to } of told.facts.changes as { field: string; to: unknown }[]) logged.policy.set(field, { seq: told.seq, value: to });
  },
};

/** Remembers what the entry says; one that cannot be read says nothing, and is named by the chain's check. */
export function noteEntry(row: Pick<CustodyEntry, "chainId" | "seq" | "body">, logged: Logged): void {
  try {
    const { action, actor, subject, facts } = JSON.parse(row.body.toString("utf8")) as Body;
    NOTED[action]?.(logged, subject.id, { chain: row.chainId, seq: row.seq, by: actor.id, action, facts });
  } catch {
    return;
  }
}
