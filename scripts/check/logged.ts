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
  told: { reads: Map<string, Told>; counts: Map<string, Told>; approvals: Map<string, Told>; revocations: Map<string, Told>; transfers: Map<string, Told> };
  /** accounts by id, as their entries leave them */
  users: Map<string, { seq: number; name: string; role: string; off: boolean }>;
  /** fields of the policy that an entry has changed, as the last one leaves them */
  policy: Map<string, { seq: number; value: unknown }>;
}

export function newLogged(): Logged {
  return {
    reads: new Map(), approvals: new Map(), revoked: new Set(), users: new Map(), policy: new Map(),
    told: { reads: new Map(), counts: new Map(), approvals: new Map(), revocations: new Map(), transfers: new Map() },
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
