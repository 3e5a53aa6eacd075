import { type Finding, readName, type Stage } from "./words";

/** What is kept beside a composite: how it was made, of which reads, and where the whole report lies. */
export interface DerivedFacts {
  /** "bit majority, n=5" */
  method: string;
  version: number;
  voters: { number: number; seating: number; sha256: string }[];
  excluded: { number: number; cause: string }[];
  disputedBytes: number;
  counts: { firm: number; weak: number; constructed: number; undecided: number };
  odds: { bitErrorRate: string; expectedWrongBitsByMargin: string; leastSureByte: string | null };
  limit: string;
  /** SHA-256 of the report (canonical JSON), stored beside the images */
  reportSha256: string;
  /** what a lead has to answer before it may be approved */
  findings: Finding[];
}

export function derivedFacts(row: { derived?: string | null }): DerivedFacts | null {
  return row.derived ? (JSON.parse(row.derived) as DerivedFacts) : null;
}

/** "Read 5, composite": a composite never goes by the plain name of a read where reads are listed. */
export function readTitle(read: { stage: Stage; number: number; derived: unknown }): string {
  return `${readName(read.stage, read.number)}${read.derived ? ", composite" : ""}`;
}
