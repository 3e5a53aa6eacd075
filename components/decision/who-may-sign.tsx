import { NOBODY_LEFT } from "@/components/chip/chip-words";
import { partText } from "@/components/composite/composite-words";
import { Note } from "@/components/ui/note";
import { listText } from "@/lib/core/quantity";
import { may } from "@/lib/core/policy";
import type { ChipView, ReadView, SessionView } from "@/lib/views";

type User = SessionView["user"];

/** `before` reads this person took or made a composite of, set aside or not: the two-person rule asks about those. */
export function readsTakenBy(chip: ChipView, userId: string): ReadView[] {
  return chip.reads.filter((r) => r.stage === "before" && r.operator.id === userId);
}

export function maySign(chip: ChipView, user: User): boolean {
  return chip.case.open && may(user, "approval.give") && !(chip.policy.twoPersonRule && readsTakenBy(chip, user.id).length > 0);
}

/** Says to the one who reads the sheet why they may or may not sign, and who may. */
export function WhoMaySign({ chip, user }: { chip: ChipView; user: User }) {
  const mine = readsTakenBy(chip, user.id);
  const foreign = chip.reads.filter((r) => r.stage === "before" && r.operator.id !== user.id);
  const others = [...new Set(foreign.map((r) => r.operator.name))];
  const can = chip.approvers.filter((p) => p.id !== user.id).map((p) => p.name);
  const who = can.length > 0 ? `${listText(can)} may sign.` : NOBODY_LEFT;
  if (!chip.case.open) return <Note kind="note" title={`Case ${chip.case.ref} is closed.`}>Nobody signs until a lead has reopened it.</Note>;
  if (!may(user, "approval.give")) {
    return <Note kind="note" title={`You are ${user.name}, ${user.role}. Leads sign this sheet.`}>{chip.policy.twoPersonRule ? "Whoever took a read of the original can’t approve its image. " : ""}{who}</Note>;
  }
  if (!maySign(chip, user)) {
    return <Note kind="caution" title={`You ${partText(mine)} of the original ${chip.designator}, so you can’t approve its image.`}>Two people, always: whoever took a read or made a composite, set aside or not, leaves the decision to somebody else. {who}</Note>;
  }
  return (
    <p>
      <b>You are {user.name}, lead.</b>{" "}
      {mine.length === 0 ? `You took no read of the original ${chip.designator}, so you may sign.` : `You ${partText(mine)} yourself; the two-person rule is off here, and every approval, log, bundle and summary says so.`}
      {others.length > 0 && chip.policy.twoPersonRule ? ` ${listText(others)}, who took its reads${foreign.some((r) => r.derived) ? " or made the composite" : ""}, may not.` : ""}
    </p>
  );
}
