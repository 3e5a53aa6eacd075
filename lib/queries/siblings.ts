import { type Sibling, siblingsOf } from "@/lib/core/two-chips";
import type { Policy } from "@/lib/core/words";
import type { Transaction } from "@/models";
import type { ChipRecord } from "./chip-records";
import { chipState } from "./chip-state";

/** The other chips of the same original board that are transferred together with this one; `records` are those of its drive. */
export async function siblingsOfRecord(records: readonly ChipRecord[], record: ChipRecord, policy: Policy, tx?: Transaction): Promise<Sibling[]> {
  const together = records.filter((one) => one.board.id === record.board.id && one.chip.needsTransfer);
  if (together.length < 2 || !record.chip.needsTransfer) return [];
  const chips = [];
  for (const one of together) {
    const { id, designator, needsTransfer } = one.chip;
    chips.push({ id, designator, needsTransfer, boardRole: one.board.role, pair: null, state: await chipState(one, policy, tx) });
  }
  return siblingsOf(chips, record.chip.id);
}
