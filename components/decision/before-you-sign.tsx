import { HelpLink } from "@/components/ui/help-link";
import { Mark } from "@/components/ui/mark";
import { countOf } from "@/lib/core/quantity";
import type { ChipView, ReadView } from "@/lib/views";

export function BeforeYouSign({ chip, composite }: { chip: ChipView; composite: ReadView | null }) {
  const donor = chip.pair?.designator ?? "chip";
  const board = chip.pair?.boardNumber ?? "its board";
  const backs = `${countOf(chip.policy.readBacks, "equal read-back")}${chip.policy.readBackSeatings > 1 ? ` in ${chip.policy.readBackSeatings} seatings` : ""}`;
  return (
    <ol className="grid grid-cols-3 gap-x-8 gap-y-[22px] narrow:grid-cols-[minmax(0,1fr)] print:grid-cols-3">
      {[
        { kind: "caution", title: `Writing erases all of donor ${donor}.`, text: chip.donorSaved ? "Its own content is saved and can be written back." : "Its own content isn’t saved yet: it would be gone." },
        composite?.derived ? { kind: "caution", title: "This image is a composite.", text: composite.derived.limit, help: "composite" } : { kind: "caution", title: "Agreeing reads aren’t proof of sound content.", text: "They show that the chip gave the same bytes each time, not that whatever broke the board left those bytes unharmed. A clip that sits wrong gives the same wrong image every time.", help: "equal" },
        { kind: "note", title: "The original is only ever read.", text: `This approval covers donor ${donor} on ${board} and no other chip. ${backs} must follow.` },
      ].map((w) => (
        <li key={w.title} className="grid grid-cols-[16px_minmax(0,1fr)] gap-2.5">
          <Mark kind={w.kind === "note" ? "note" : "caution"} className="mt-0.5 [--hole:var(--paper)]" />
          <span><b className="block">{w.title}</b>{w.text}{w.help ? <> <HelpLink href={`/help/limits#${w.help}`} about={w.title} words="More in the help" /></> : null}</span>
        </li>
      ))}
    </ol>
  );
}
