import { clockText, momentText } from "@/components/ui/times";
import type { ChipStateCode } from "@/lib/core/words";
import type { ChipView } from "@/lib/views";

const HERE: Record<ChipStateCode, number> = {
  unread: 1, "needs-reads": 1, "reads-disagree": 1, held: 1, ready: 2, approved: 3, failed: 3, written: 4, verified: 5,
};
const FAULTS: readonly ChipStateCode[] = ["reads-disagree", "held", "failed"];

interface Step {
  name: string;
  note: string;
}

function steps(chip: ChipView, timeZone: string): Step[] {
  const here = HERE[chip.state.state];
  const counted = chip.reads.filter((r) => r.counted);
  const before = counted.filter((r) => r.stage === "before");
  const lastRead = before.at(-1);
  const transfer = chip.transfers.at(-1);
  const backs = counted.filter((r) => r.stage === "after" && r.transferId === transfer?.id);
  const lastBack = backs.at(-1);
  const approved = here > 2 && chip.approval;
  return [
    { name: "Received", note: momentText(chip.receivedAt, timeZone) },
    { name: "Read", note: here > 1 && lastRead ? momentText(lastRead.storedAt, timeZone) : here === 1 ? `${chip.agreeingReads} of ${chip.policy.reads} agree` : "" },
    { name: approved ? "Approved" : "Approve", note: approved ? momentText(approved.givenAt, timeZone) : here === 2 ? (chip.request && !chip.request.sentBack ? `asked ${momentText(chip.request.askedAt, timeZone)}` : "waiting for approval") : here < 2 ? "opens when reads agree" : "" },
    { name: here > 3 ? (transfer?.kind === "chip-moved" ? "Moved" : "Written") : "Write", note: here > 3 && transfer ? momentText(transfer.at, timeZone) : here === 3 ? "cleared to write" : "" },
    { name: "Read back", note: here > 4 && lastBack ? `${backs.length} equal, ${clockText(lastBack.storedAt, timeZone)}` : here === 4 ? `${backs.length} of ${chip.policy.readBacks}` : "" },
    { name: "Return", note: here === 5 ? (chip.case.open ? "pack the board" : "case closed") : "" },
  ];
}

/** A chip's way as a copper trace through plated holes; what went wrong is a dead-end spur, drawn as a square. */
export function Route({ chip, timeZone }: { chip: ChipView; timeZone: string }) {
  // nothing is left to do once the case is closed
  const here = HERE[chip.state.state] + (chip.state.state === "verified" && !chip.case.open ? 1 : 0);
  const fault = FAULTS.includes(chip.state.state);
  return (
    <ol className="route" aria-label="Route of this chip">
      {steps(chip, timeZone).map((step, i) => (
        <li key={i} className={i < here ? "done" : i === here ? `here ${fault ? "fault" : ""}` : ""} aria-current={i === here ? "step" : undefined}>
          <i className="hole" aria-hidden="true" />
          <b>{step.name}{i < here ? <span className="sr-only">, done</span> : null}</b>
          <span>{i === here && fault ? chip.state.label : step.note}</span>
        </li>
      ))}
    </ol>
  );
}
