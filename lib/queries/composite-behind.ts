import { agreement } from "@/lib/core/chip-state";
import { derivedFacts } from "@/lib/core/derived";
import type { CompositeMark } from "@/lib/views";
import { stateRead } from "./chip-facts";
import type { ChipRecord } from "./chip-records";

/** The image that the chip stands for now: the approved or written one, else that of the largest agreeing group. */
export function imageAtStake(record: ChipRecord): string | null {
  const latest = record.transfers.at(-1);
  const approval = record.standing ?? record.approvals.find((a) => a.id === latest?.approvalId);
  if (approval) return approval.sha256.toString("hex");
  return agreement(record.before.filter((r) => r.counted).map(stateRead)).largest?.sha256 ?? null;
}

/** The composite that this image is, or null: as soon as a read of the chip holds the same bytes it is that read's image. */
export function compositeBehind(record: ChipRecord, sha256: string | null): CompositeMark | null {
  const holders = record.before.filter((r) => r.counted && r.sha256.toString("hex") === sha256);
  if (holders.length === 0 || holders.some((r) => !r.derived)) return null;
  const facts = derivedFacts(holders[0]);
  return facts && { number: holders[0].number, reads: facts.voters.length, seatings: new Set(facts.voters.map((v) => v.seating)).size };
}
