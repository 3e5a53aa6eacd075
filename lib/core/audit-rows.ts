import type { ClockReading, EntryReading, SessionEnd } from "./audit";
import type { Role, SealCause } from "./words";

/** What the rows of the audit pages hold: plain values, times as RFC 3339 in UTC, digests in lower-case hex. */

/** Where an entry or a log stands; a chain that is no drive's on record has neither letter nor case. */
export interface ChainPlace {
  chainId: string;
  workshop: boolean;
  driveId: string | null;
  letter: string;
  caseId: string | null;
  caseRef: string;
}

export interface AuditEntryRow extends EntryReading, ChainPlace {
  seq: number;
  hash: string;
}

export interface ChainRow extends ChainPlace {
  /** part number, model or serial */
  label: string;
  entries: number;
  /** hash of the last entry; empty where the log has no head */
  hash: string;
  lastAt: string;
  /** the last check of the whole log; null while there was none */
  check: { at: string; entries: number; findings: number; first: string | null } | null;
}

export interface ChainCounts {
  total: number;
  clean: number;
  findings: number;
  unchecked: number;
  /** when the log that was checked longest ago was checked; null while one was never checked */
  oldestCheck: string | null;
}

/** One finding of a chain's check, as in `CustodyCheckView`. */
export interface LogFinding {
  seq: number | null;
  problem: string;
  expected?: string;
  found?: string;
}

export interface AssessmentRow extends AuditEntryRow {
  /** what the check still finds that this assessment was the first to cover */
  covered: LogFinding[];
}

/** A log that doesn't check out and that nobody has assessed since. */
export interface WaitingLog extends ChainPlace {
  checkedAt: string;
  /** what no assessment covers, the first twenty */
  findings: LogFinding[];
  count: number;
}

/** One session: who, from when to when. Its id is not here: the cookie carries it. */
export interface SessionRow {
  who: string;
  role: Role;
  from: string;
  lastStep: string;
  ended: string | null;
  how: SessionEnd;
}

/** A bench token by its name, never the token or its hash. */
export interface TokenRow {
  name: string;
  who: string;
  role: Role;
  made: string;
  lastUsed: string | null;
  withdrawn: string | null;
}

export interface StoredImageRow {
  sha256: string;
  sizeBytes: number;
  state: "sound" | "damaged" | "missing" | "erased";
  storedAt: string;
  /** when its bytes were given up; null while they are stored */
  erasedAt: string | null;
  /** when its bytes were last read whole; null since it was stored */
  checkedAt: string | null;
  /** at most the first twelve, "Case 26-0042, Drive A, Orig U12, Read 2" */
  uses: { name: string; chipId: string | null; driveId: string | null; caseId: string | null }[];
  useCount: number;
}

export interface ImageCounts {
  total: number;
  damaged: number;
  missing: number;
  /** when the bytes that were verified longest ago were verified; null without an image */
  oldest: string | null;
  neverChecked: number;
  /** whether the reading again keeps up with its settings, and that as a sentence */
  keeping: "off" | "stopped" | "behind" | "keeping-up";
  keepingSentence: string;
  /** days within which each is read again, 0 for never; MiB a second at most; hours that one reading of all takes */
  days: number;
  mebibytesPerSecond: number;
  hours: number;
}

/** A seal in a list: what it states and why it was made. */
export interface SealRow {
  number: number;
  /** RFC 3339 UTC, as the seal itself says */
  at: string;
  cause: SealCause;
  chains: number;
  root: string;
  prev: string;
  /** SHA-256 of the seal's text */
  sha256: string;
  keyId: string;
}

export interface AuditSealRow extends SealRow {
  /** what is wrong with it or with its link to the one before; empty when nothing is */
  faults: string[];
  /** mails to auditors that carry it: sent, and still on their way or given up */
  mailed: { sent: number; waiting: number; givenUp: number };
}

export interface SealState {
  total: number;
  newest: AuditSealRow | null;
  /** made on the workshop's present day */
  today: boolean;
  /** numbers of seals with a fault, the first ten */
  faulty: number[];
}

export interface Latest {
  at: string;
  sentence: string;
  total: number;
}

/** Everything the overview says; what is not there for this auditor is null. */
export interface AuditOverview {
  now: string;
  logs: ChainCounts;
  waiting: WaitingLog[];
  images: ImageCounts;
  seals: SealState | null;
  clock: ClockReading;
  handOuts: Latest;
  refusals: Latest;
  assessments: Latest;
  clockEntries: Latest;
  limits: Latest | null;
  openSessions: number | null;
}
