import type { BoardRole, EraseCause, Finding, Format, Method, Stage } from "@/lib/core/words";
import type { PersonView } from "./person";

/** The stored bytes were given up; digest, size and findings stay. */
export interface ErasedView {
  at: string;
  cause: EraseCause;
  /** the sentence for whoever would open it */
  text: string;
}

export interface ReadView {
  id: string;
  chipId: string;
  number: number;
  stage: Stage;
  seating: number;
  sizeBytes: number;
  /** 8 lower-case hex digits; the screen shows them in upper case */
  crc32: string;
  sha256: string;
  counted: boolean;
  findings: Finding[];
  format: Format;
  fileName: string;
  reader: string;
  method: Method | null;
  toolVersion: string | null;
  adapter: string | null;
  supplyMillivolts: number | "unknown" | null;
  clockKilohertz: number | null;
  controllerHeld: boolean | null;
  note: string | null;
  operator: PersonView;
  /** claimed by the uploader */
  takenAt: string | null;
  modifiedAt: string | null;
  storedAt: string;
  /** for `after` reads: the transfer they belong to */
  transferId: string | null;
  setAside: { reason: string; by: PersonView; at: string } | null;
  /** the text file the image was expanded from */
  source: { sha256: string; base: number; fill: number } | null;
  /** for a composite: how it was made */
  derived: { method: string; voters: number[]; excluded: number[]; disputedBytes: number; weak: number; constructed: number; limit: string } | null;
  /** false when the stored image is damaged, missing or erased */
  imageSound: boolean;
  erased?: ErasedView | null;
}

/** Behind a composite: who voted what for each disputed byte (the stored report, CompositeReport of lib/core). */
export interface VotesView {
  method: string;
  sha256: string;
  sources: { number: number | null; seating: number; sha256: string }[];
  excluded: { number: number | null; cause: string }[];
  disputed: { at: number; values: number[]; chosen: number; support: number; margin: number; standing: "firm" | "weak" | "constructed" | "undecided" }[];
  counts: { firm: number; weak: number; constructed: number; undecided: number; disputed: number };
  odds: { bitErrorRate: string; expectedWrongBitsByMargin: string; leastSureByte: string | null };
  limit: string;
  truncated: boolean;
}

export interface GroupView {
  sha256: string;
  stage: Stage;
  reads: number[];
  seatings: number;
}

export interface FindHit {
  readId: string;
  readName: string;
  chipId: string;
  designator: string;
  boardRole: BoardRole;
  caseId: string;
  caseRef: string;
  driveLetter: string;
  crc32: string;
  sha256: string;
  counted: boolean;
}
