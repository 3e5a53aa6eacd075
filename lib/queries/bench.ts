import { allow, inCases } from "@/lib/commands/refuse";
import { may } from "@/lib/core/policy";
import type { Actor, ChipStateCode, Policy } from "@/lib/core/words";
import { env } from "@/lib/env";
import type { BenchRow, StateView } from "@/lib/views";
import { Case, Drive, User } from "@/models";
import { donorContentSaved } from "./chip-facts";
import { type ChipRecord, chipRecords } from "./chip-records";
import { holdOf } from "./cases";
import { chipState } from "./chip-state";
import { originalSummary } from "./chip-summary";
import { people } from "./people";
import { currentPolicy } from "./policy";
import { seenBy } from "./seen-by";
import { dayIn } from "./workshop-day";

/** `needs-reads` stands with `unread`: one group on the bench, by due date. */
const ORDER: ChipStateCode[] = ["unread", "reads-disagree", "held", "ready", "approved", "written", "failed", "verified"];

/** What lies on the bench: every chip of an open case that needs a transfer, in the order of its way. */
export async function benchRows(actor: Actor): Promise<BenchRow[]> {
  allow(actor, "case.read");
  const open = await Case.findAll({ where: { closedAt: null, ...inCases(actor, "id") }, attributes: ["id"] });
  const drives = await Drive.findAll({ where: { caseId: open.map((c) => c.id) }, attributes: ["id"] });
  const [{ records }, policy, who] = [await chipRecords(drives.map((d) => d.id)), await currentPolicy(), await people()];
  const leads = await User.findAll({ where: { role: "lead", disabledAt: null }, order: ["name"] });
  const today = dayIn(env().timeZone, new Date());
  const rows = await Promise.all(records.filter((r) => r.chip.needsTransfer).map(async (record): Promise<BenchRow> => {
    const state = await chipState(record, policy);
    const due = record.case.dueOn ?? null;
    const lateDays = due ? Math.round((Date.parse(today) - Date.parse(due)) / 86_400_000) : 0;
    const hand = inWhoseHands(record, state, policy, leads.map((l) => l.id));
    return {
      chip: await originalSummary(record, state), caseId: record.case.id, caseRef: record.case.ref, customerName: record.customer.name,
      partNumber: record.drive.partNumber ?? record.drive.model ?? record.drive.serial ?? "", dueOn: due,
      late: due === null ? null : lateDays > 0 ? "late" : lateDays === 0 ? "today" : null, lateDays: Math.max(0, lateDays),
      ...nextStep(record, state), with: hand.length > 0 ? who(hand[0]).name : "anyone", hold: holdOf(record.case),
      mine: hand.includes(actor.id) || (hand.length === 0 && may(actor, "read.store")),
    };
  }));
  const place = ({ chip: { state } }: BenchRow) => ORDER.indexOf(state.state === "needs-reads" ? "unread" : state.state);
  return seenBy(actor, rows.sort((a, b) => place(a) - place(b) || (a.dueOn ?? "9").localeCompare(b.dueOn ?? "9") || a.caseRef.localeCompare(b.caseRef)));
}

/** Who acts next: leads who may sign while it waits for approval, else whoever did the last thing at the bench. */
function inWhoseHands(record: ChipRecord, state: StateView, policy: Policy, leads: string[]): string[] {
  if (state.state === "ready" || state.state === "held") {
    const takers = new Set(record.before.map((r) => r.operatorId));
    const free = leads.filter((id) => !policy.twoPersonRule || !takers.has(id));
    return free.length > 0 ? free : leads;
  }
  const last = record.backs.at(-1)?.operatorId ?? record.transfers.at(-1)?.byUserId ?? record.before.at(-1)?.operatorId ?? record.own.at(-1)?.operatorId;
  return last ? [last] : [];
}

function nextStep(record: ChipRecord, state: StateView): { next: string; nextWhy: string | null } {
  if (record.case.returnedAt) return { next: state.sentence, nextWhy: "It has gone back: a lead closes the case." };
  if (["unread", "needs-reads", "ready"].includes(state.state) && record.donor && !donorContentSaved(record)) {
    return { next: state.sentence, nextWhy: `Also save the content of donor ${record.donor.chip.designator}: two equal reads.` };
  }
  return { next: state.sentence, nextWhy: record.donor ? null : "No donor chip is paired yet." };
}
