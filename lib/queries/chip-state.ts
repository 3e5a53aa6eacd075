import { compareIfStored } from "@/lib/commands/compare-images";
import { agreement, deriveChipState, oddOneOut, type StateFacts } from "@/lib/core/chip-state";
import { looksLikeText } from "@/lib/core/diagnose-pair";
import { causeAdvice } from "@/lib/core/diagnose-sentences";
import type { Policy } from "@/lib/core/words";
import type { StateView } from "@/lib/views";
import type { Transaction } from "@/models";
import { stateFacts, stateRead } from "./chip-facts";
import type { ChipRecord } from "./chip-records";

/** The state of a chip with its sentence; where reads disagree the sentence says where and what it looks like. */
export async function chipState(record: ChipRecord, policy: Policy, tx?: Transaction): Promise<StateView> {
  return deriveChipState(stateFacts(record, policy, await worstPair(record, tx)));
}

/** The odd counted read and one that most others equal, compared; null when the reads agree. */
export async function worstPair(record: ChipRecord, tx?: Transaction): Promise<StateFacts["worst"]> {
  const counted = record.before.filter((r) => r.counted);
  const reads = counted.map(stateRead);
  if (agreement(reads).groups.length < 2) return null;
  const oddNumber = oddOneOut(reads);
  const odd = reads.find((r) => r.counted && r.number === oddNumber) ?? reads.at(-1)!;
  const other = reads.find((r) => r.sha256 !== odd.sha256)!;
  const [rowOdd, rowOther] = [odd, other].map((r) => counted.find((row) => row.id === r.id)!);
  if (record.unsound.has(odd.sha256) || record.unsound.has(other.sha256)) return null;
  const c = await compareIfStored({ sha256: other.sha256, sizeBytes: rowOther.sizeBytes }, { sha256: odd.sha256, sizeBytes: rowOdd.sizeBytes }, tx, record.chip.sizeBytes);
  if (!c) return null;
  return {
    oddRead: odd.number, otherRead: other.number, differingBytes: c.differingBytes, first: c.first ?? 0, last: c.last ?? 0,
    looksLike: looksLikeText(c.cause.code), advice: causeAdvice(c.cause.code),
  };
}
