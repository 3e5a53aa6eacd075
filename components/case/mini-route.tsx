import type { ChipStateCode } from "@/lib/core/words";

const HERE: Record<ChipStateCode, number> = {
  unread: 0, "needs-reads": 0, "reads-disagree": 0, held: 0, ready: 1, approved: 2, failed: 2, written: 3, verified: 4,
};
const FAULTS: readonly ChipStateCode[] = ["reads-disagree", "held", "failed"];
const STEPS = ["Read", "approve", "write", "read back"];

/** Read, approve, write, read back: how far the chip is. */
export function MiniRoute({ state }: { state: ChipStateCode }) {
  const here = HERE[state];
  const place = here === STEPS.length ? "All four steps are done" : `At step ${here + 1} of 4: ${STEPS[here]}${FAULTS.includes(state) ? ", held up" : ""}`;
  return (
    <>
      <span className="mini-route" aria-hidden="true">{STEPS.map((step, i) => <i key={step} className={i < here ? "d" : i === here ? (FAULTS.includes(state) ? "x" : "h") : ""} />)}</span>
      <span className="sr-only">{place}</span>
    </>
  );
}
