import type { Finding, Stage } from "./words";

/** What the rules need to know of a read. */
export interface StateRead {
  id: string;
  /** counts per chip and stage, as shown */
  number: number;
  stage: Stage;
  seating: number;
  sha256: string;
  sizeBytes: number;
  counted: boolean;
  findings: Finding[];
  operatorId: string;
  /** of a composite: how many reads were voted into it, and their seatings; it stands for them in the count */
  voters?: { reads: number; seatings: number[] };
}

export interface AgreementGroup {
  sha256: string;
  /** read numbers, rising */
  reads: number[];
  /** distinct seatings, rising; those of a composite's voters included */
  seatings: number[];
  /** reads that stand behind the image: its own, and for a composite those that were voted into it */
  behind: number;
}

const rising = (a: number, b: number) => a - b;

/** Counted reads grouped by image, largest group first, the older first among equals. One stage at a time. */
export function agreement(reads: readonly StateRead[]): { groups: AgreementGroup[]; largest: AgreementGroup | null } {
  const bySha = new Map<string, StateRead[]>();
  for (const read of reads) {
    if (read.counted) bySha.set(read.sha256, [...(bySha.get(read.sha256) ?? []), read]);
  }
  const groups = [...bySha].map(([sha256, members]) => ({
    sha256,
    reads: members.map((read) => read.number).sort(rising),
    seatings: [...new Set(members.flatMap((read) => read.voters?.seatings ?? [read.seating]))].sort(rising),
    behind: members.reduce((sum, read) => sum + (read.voters?.reads ?? 1), 0),
  })).sort((a, b) => b.behind - a.behind || a.reads[0] - b.reads[0]);
  return { groups, largest: groups[0] ?? null };
}

/** Number of the newest counted read outside the one largest group; null when all agree or no group is largest. */
export function oddOneOut(reads: readonly StateRead[]): number | null {
  const { groups } = agreement(reads);
  if (groups.length < 2 || groups[0].behind === groups[1].behind) return null;
  return Math.max(...groups.slice(1).flatMap((group) => group.reads));
}

/**
 * The donor's own content is safe: two counted, equal, full-size `donor` reads, and none counted that disagrees.
 * One seating is enough, any content is fine.
 */
export function donorSaved(reads: readonly StateRead[], sizeBytes: number): boolean {
  const { groups } = agreement(reads.filter((read) => read.stage === "donor"));
  const own = reads.find((read) => read.counted && read.stage === "donor");
  return groups.length === 1 && groups[0].reads.length >= 2 && own?.sizeBytes === sizeBytes;
}
