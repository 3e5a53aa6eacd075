import { agreement } from "@/lib/core/chip-state";
import { listText, readsText } from "@/lib/core/quantity";
import { type Policy, seatingLetter } from "@/lib/core/words";
import { stateRead } from "./chip-facts";
import type { ChipRecord } from "./chip-records";
import { compositeBehind, imageAtStake } from "./composite-behind";
import { inCommon } from "./in-common";

const plural = (n: number, one: string) => `${n} ${one}${n === 1 ? "" : "s"}`;

/**
 * The paragraph under the verdict: what the reads show, what those that differ have in common, what the policy asks, and
 * what equal reads do not show.
 */
export async function why(record: ChipRecord, policy: Policy): Promise<string> {
  const latest = record.transfers.at(-1);
  if (latest) {
    const backs = record.backs.filter((r) => r.transferId === latest.id && r.counted).map(stateRead);
    const composite = compositeBehind(record, imageAtStake(record));
    const seatings = new Set(backs.map((b) => b.seating)).size;
    return `${plural(backs.length, "read-back")} of the latest transfer counted, in ${plural(seatings, "seating")}; the workshop's policy asks for ${policy.readBacks} in ${policy.readBackSeatings}, each equal to the approved image in every byte.${composite ? ` That image, ${readsText([composite.number])}, is a composite of ${composite.reads} reads: a majority shows what repeats, not what is true.` : ""}`;
  }
  const reads = record.before.filter((r) => r.counted).map(stateRead);
  if (reads.length === 0) return `The workshop's policy asks for ${policy.reads} equal reads in ${policy.seatings} seatings. Take power away before the clip goes on, and wear the wrist strap.`;
  const { groups, largest } = agreement(reads);
  const size = record.chip.sizeBytes.toLocaleString("en");
  if (!largest) return "";
  const names = readsText(largest.reads);
  const seatings = largest.seatings.length === 1 ? `seating ${seatingLetter(largest.seatings[0])}` : `seatings ${listText(largest.seatings.map(seatingLetter))}`;
  const voted = largest.behind > largest.reads.length;
  const agree = voted ? `${names} is a composite and stands for the ${largest.behind} reads that were voted into it, ${seatings}.` : largest.reads.length > 1 ? `${names} agree in all ${size} bytes, ${seatings}.` : groups.length > 1 ? "No two reads agree." : `${names} stands alone so far.`;
  const needed = Math.max(0, policy.reads - largest.behind);
  const more = needed > 0 ? ` ${plural(needed, voted ? "more read" : "more agreeing read")} ${needed === 1 ? "is" : "are"} needed.` : "";
  const limit = voted ? " A majority shows what repeats, not what is true." : groups.length === 1 && needed === 0 ? " Equal reads show that the chip gave the same bytes each time, not that the damage left those bytes unharmed; a clip that sits wrong gives the same wrong image every time." : "";
  const common = groups.length > 1 ? (await inCommon(record, policy)).map((sentence) => ` ${sentence}`).join("") : "";
  return agree + common + more + limit;
}
