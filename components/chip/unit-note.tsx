import { Fragment } from "react";
import { FindingLine } from "@/components/ui/finding-line";
import { crossedPairs, leftBehind, leftBehindOf, type Sibling, unitOf, unitWords } from "@/lib/core/two-chips";
import type { ChipSummary, ChipView } from "@/lib/views";

/** Chips of one board that are transferred together, and what is not in step: for the case and the drive. */
export function UnitNote({ chips }: { chips: readonly ChipSummary[] }) {
  const unit = unitOf(chips);
  const behind = leftBehind(chips);
  const crossed = crossedPairs(chips);
  if (unit.length === 0 && crossed.length === 0) return null;
  return (
    <div className="text-t3">
      {unit.length > 0 ? <FindingLine kind="note">{unitWords(unit.map((chip) => chip.designator))}</FindingLine> : null}
      {behind ? <FindingLine kind="caution">{behind}</FindingLine> : null}
      {crossed.map((words) => <FindingLine key={words} kind="caution">{words} Look at both boards.</FindingLine>)}
    </div>
  );
}

/** "U14: To read", each with the way to its page. */
function Siblings({ siblings }: { siblings: readonly Sibling[] }) {
  return siblings.map((one, i) => <Fragment key={one.id}>{i > 0 ? ", " : " "}<a href={`/chips/${one.id}`}>{one.designator}</a>: {one.label}</Fragment>);
}

/** The same for the pages of one chip, with how far the others are. */
export function SiblingNote({ chip }: { chip: Pick<ChipView, "designator" | "boardRole" | "pair" | "state" | "siblings"> }) {
  if (chip.siblings.length === 0) return null;
  // a donor's chip speaks for the original's that it stands for
  const own = chip.boardRole === "original" ? chip.designator : chip.pair?.designator ?? chip.designator;
  const behind = leftBehindOf({ designator: own, state: chip.state }, chip.siblings);
  return (
    <div className="text-t3">
      <FindingLine kind="note">{unitWords([own, ...chip.siblings.map((one) => one.designator)])} Now<Siblings siblings={chip.siblings} />.</FindingLine>
      {behind ? <FindingLine kind="caution">{behind}</FindingLine> : null}
    </div>
  );
}
