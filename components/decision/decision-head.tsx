import { EncryptionNote } from "@/components/chip/encryption-note";
import { SiblingNote } from "@/components/chip/unit-note";
import { compositeBehind, madeOf, votesAnchor } from "@/components/composite/composite-words";
import { Crumbs } from "@/components/ui/crumbs";
import { Mark } from "@/components/ui/mark";
import { DesignatorPlate } from "@/components/ui/plate";
import { dueText, momentText } from "@/components/ui/times";
import type { ChipView, DecisionView } from "@/lib/views";

function asked(chip: ChipView, timeZone: string): string {
  const due = chip.case.dueOn ? `, due ${dueText(chip.case.dueOn)}` : "";
  if (chip.approval) return `Decision sheet, signed by ${chip.approval.approvedBy.name}, ${momentText(chip.approval.givenAt, timeZone)}${due}`;
  const request = chip.request && !chip.request.sentBack ? chip.request : null;
  if (request) return `Decision sheet, asked for by ${request.askedBy.name}, ${momentText(request.askedAt, timeZone)}${due}`;
  return `Decision sheet, not asked for yet${due}`;
}

export function DecisionHead({ view: { chip, image }, timeZone }: { view: DecisionView; timeZone: string }) {
  const composite = compositeBehind(chip.reads, image?.sha256);
  const what = composite ? "composite" : "image";
  const message = !chip.approval && chip.request && !chip.request.sentBack ? chip.request.message : null;
  return (
    <>
      <Crumbs items={[{ label: `Case ${chip.case.ref}`, href: `/cases/${chip.case.id}` }, { label: chip.designator, href: `/chips/${chip.id}` }, { label: "Decision sheet" }]} />
      <header className="flex flex-wrap items-end justify-between gap-x-8 gap-y-3 pt-4 pb-5">
        <div className="min-w-0">
          <p className="text-ink-2">{asked(chip, timeZone)}</p>
          <h1 className="mt-0.5 text-t7 font-bold tracking-[-0.012em] text-balance phone:text-[1.625rem] phone:leading-8">
            {chip.approval ? `This ${what} may be written to donor ${chip.pair?.designator ?? ""}.` : chip.pair ? `May this ${what} be written to donor ${chip.pair.designator}?` : `May this ${what} be written to a donor?`}
          </h1>
          {composite?.derived ? <p className="mt-1 flex items-start gap-2"><Mark kind="caution" className="mt-0.5 [--hole:var(--paper)]" /><span><b>No read gave this image.</b> {madeOf(composite.derived)}. <a href={`#${votesAnchor(composite)}`}>See the votes</a></span></p> : null}
          {message ? <p className="mt-1 max-w-[62ch] text-ink-2">“{message}”</p> : null}
        </div>
        <div className="flex items-center gap-3.5 slim:gap-2">
          <DesignatorPlate designator={chip.designator} board="original" word large />
          <svg viewBox="0 0 92 40" aria-hidden="true" className="h-10 w-[92px] slim:w-14">
            <path d="M8 20h22l10-10h22l10 10h10" fill="none" stroke="var(--copper-2)" strokeWidth="3" />
            <circle cx="8" cy="20" r="5" fill="var(--paper)" stroke="var(--copper-2)" strokeWidth="4" />
            <path d="M78 12l11 8-11 8z" fill="var(--copper-2)" />
          </svg>
          {chip.pair ? <DesignatorPlate designator={chip.pair.designator} board="donor" word large /> : <span className="text-ink-2">no donor chip yet</span>}
        </div>
      </header>
      <div className="grid gap-2 pb-4 empty:hidden"><EncryptionNote encryption={chip.drive.encryption} /><SiblingNote chip={chip} /></div>
    </>
  );
}
