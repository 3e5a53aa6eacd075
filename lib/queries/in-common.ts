import { comparisonOnRecord } from "@/lib/commands/compare-images";
import { sayCause } from "@/lib/core/diagnose-pair";
import { judgeSet, type SetPair } from "@/lib/core/judge-set";
import { type Policy, readName } from "@/lib/core/words";
import { stateRead } from "./chip-facts";
import type { ChipRecord } from "./chip-records";

/**
 * What the reads outside the largest agreeing group have in common, one sentence each: the seating that no other has, or
 * the cause that all their comparisons gave. From comparisons on record only: no image is opened for it. While no two
 * reads agree nothing can be said of "the others", and beside a composite its votes say it.
 */
export async function inCommon(record: ChipRecord, policy: Policy): Promise<string[]> {
  const { sizeBytes, sizeSource } = record.chip;
  const counted = record.before.filter((r) => r.counted);
  if (counted.some((r) => r.derived)) return [];
  const reads = counted.map(stateRead);
  const { groups } = judgeSet(reads, new Map(), [], policy, { sizeBytes, sizeSource });
  if (groups.length < 2 || groups[0].reads.length < 2) return [];
  const main = reads.find((r) => r.number === groups[0].reads[0])!;
  const pairs: SetPair[] = [];
  for (const odd of reads.filter((r) => r.sha256 !== main.sha256)) {
    const comparison = await comparisonOnRecord(main, odd, undefined, main.sizeBytes === odd.sizeBytes ? undefined : sizeBytes);
    if (!comparison) continue;
    const names = { nameA: readName("before", main.number), nameB: readName("before", odd.number), sizeBytes };
    pairs.push({ a: main.number, b: odd.number, result: { comparison, diagnosis: sayCause(comparison, comparison.cause, names) } });
  }
  return judgeSet(reads, new Map(), pairs, policy, { sizeBytes, sizeSource }).common;
}
