import type { ReactNode } from "react";
import { BoardPanel } from "@/components/shell/board-panel";
import { boardName } from "@/lib/core/board-name";
import { PrintMenu } from "@/components/print/print-menu";
import { chipPrints } from "@/components/print/print-words";
import { Crumbs } from "@/components/ui/crumbs";
import { Mark } from "@/components/ui/mark";
import { dueText } from "@/components/ui/times";
import { sizeText } from "@/lib/core/quantity";
import { rangeText } from "@/lib/core/strip";
import type { ChipView } from "@/lib/views";
import { headState, isKept, kindText, supplyText } from "./chip-words";
import { Route } from "./route";

/** A chip of eight pins from above; our own drawing, not a photo. */
function Outline() {
  return (
    <svg viewBox="0 0 112 104" aria-hidden="true" className="h-[104px] w-[112px] flex-none phone:h-[72px] phone:w-[78px] print:h-[60px] print:w-[64px]">
      <path fill="var(--pad)" d="M16 4h10v18H16zM39 4h10v18H39zM62 4h10v18H62zM85 4h10v18H85zM16 82h10v18H16zM39 82h10v18H39zM62 82h10v18H62zM85 82h10v18H85z" />
      <path fill="var(--mask-deep)" stroke="var(--silk)" strokeWidth="2" d="M6 22h100v60H6V60a8 8 0 0 0 0-16z" />
      <circle fill="var(--silk)" cx="21" cy="69" r="4" />
    </svg>
  );
}

function Fact({ term, children, mono }: { term: string; children: ReactNode; mono?: boolean }) {
  return (
    <div className="min-w-0">
      <dt className="text-t1 text-silk-2">{term}</dt>
      <dd className={`font-medium [overflow-wrap:anywhere] ${mono ? "font-mono" : ""}`}>{children}</dd>
    </div>
  );
}

/** "Due today", "Due Thu 12 Mar", "Was due Thu 12 Mar". `today` is the workshop's calendar day. */
function dueWords(dueOn: string, today: string): string {
  if (dueOn === today) return `Due today, ${dueText(dueOn)}`;
  return dueOn < today ? `Was due ${dueText(dueOn)}` : `Due ${dueText(dueOn)}`;
}

export function ChipHead({ chip, timeZone, today }: { chip: ChipView; timeZone: string; today: string }) {
  const original = chip.boardRole === "original";
  const { mark, label } = headState(chip);
  return (
    <BoardPanel label={`Chip ${chip.designator}`}>
      <Crumbs items={[
        { label: `Case ${chip.case.ref}`, href: `/cases/${chip.case.id}` },
        { label: `Drive ${chip.drive.letter}`, href: `/cases/${chip.case.id}#drive-${chip.drive.letter}` },
        { label: original ? `${chip.designator}, original${chip.pair ? " to donor" : ""}` : `${chip.designator}, donor` },
      ]} />
      <div className="grid grid-cols-[auto_minmax(0,1fr)_auto] items-center gap-8 pt-3.5 pb-[18px] narrow:grid-cols-[auto_1fr] narrow:gap-x-6 narrow:gap-y-[18px] phone:pt-2.5 phone:pb-4 print:gap-x-4 print:gap-y-2.5">
        <div className="flex items-center gap-[18px] phone:gap-3">
          <Outline />
          <h1 className="font-mono !text-t8 font-semibold tracking-[-0.02em] phone:!text-[2.75rem] phone:!leading-[2.75rem] print:!text-[2.25rem] print:!leading-10">
            {chip.designator}
            <small className="mt-0.5 block max-w-[24ch] font-face text-t2 font-medium tracking-normal text-silk-2">{chip.holds ?? "chip"}</small>
          </h1>
        </div>
        <dl className="grid grid-cols-[repeat(4,auto)] justify-start gap-x-9 gap-y-2.5 mid:gap-x-6 narrow:col-span-full narrow:row-start-2 phone:grid-cols-[auto_auto] phone:gap-x-7 print:col-span-full print:row-start-2">
          <Fact term="Kind">{kindText(chip.bus, chip.sizeBytes)}</Fact>
          <Fact term="Package, supply">{chip.package ?? "package unknown"}, {supplyText(chip.supplyMillivolts)}</Fact>
          <Fact term="Size and addresses">{sizeText(chip.sizeBytes)}, <span className="font-mono whitespace-nowrap">{rangeText(0, chip.sizeBytes, chip.sizeBytes)}</span></Fact>
          <Fact term="Top mark" mono>{chip.marking ?? "not recorded"}</Fact>
          <Fact term="Drive" mono>{chip.drive.partNumber ?? chip.drive.model ?? chip.drive.serial ?? "not recorded"}</Fact>
          <Fact term="Board" mono>{boardName(chip.board)}</Fact>
          <Fact term="Customer">{chip.case.customerName}</Fact>
          <Fact term={original ? "Donor" : "Original"} mono={Boolean(chip.pair)}>{chip.pair ? `${chip.pair.boardNumber} ${chip.pair.designator}` : "not paired yet"}</Fact>
        </dl>
        <div className="grid justify-items-end gap-0.5 text-right narrow:justify-self-end">
          <span className="flex items-center gap-[9px] text-t5 font-strong phone:text-t4"><Mark kind={mark} size={20} /><span className={mark === "block" ? "text-block" : ""}>{label}</span></span>
          {chip.case.dueOn ? <span>{dueWords(chip.case.dueOn.slice(0, 10), today)}</span> : null}
          {original ? null : <span className="text-silk-2">State of the original it is paired with</span>}
          <PrintMenu links={chipPrints(chip.case.id, chip.id, chip.boardRole)} atRight />
        </div>
      </div>
      {isKept(chip) ? null : <Route chip={chip} timeZone={timeZone} />}
    </BoardPanel>
  );
}
