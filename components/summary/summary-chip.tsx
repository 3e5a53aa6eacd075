import { Fragment, type ReactNode } from "react";
import { LaneSvg, StripSvg } from "@/components/strip/strip-svg";
import { DigestInFull } from "@/components/ui/digest";
import { Mark } from "@/components/ui/mark";
import { DesignatorPlate } from "@/components/ui/plate";
import { dayText } from "@/components/ui/times";
import { countOf, sizeText } from "@/lib/core/quantity";
import { compositeSentences, readByText, seatingsText } from "@/lib/core/summary-words";
import type { SummaryView } from "@/lib/views";

type Chip = SummaryView["drives"][number]["chips"][number];

function Fact({ term, children, whole, mono }: { term: string; children: ReactNode; whole?: boolean; mono?: boolean }) {
  return <div className={whole ? "whole" : ""}><dt>{term}</dt><dd className={mono ? "font-mono" : ""}>{children}</dd></div>;
}

/** One chip: state, the drawn image, and every number somebody may want to compare, in full. */
export function SummaryChip({ chip, timeZone, both }: { chip: Chip; timeZone: string; both: boolean }) {
  const moved = chip.transferKind === "chip-moved";
  const read = readByText(chip);
  return (
    <section className="sheet-chip grid gap-[7px] border-t border-rule-2 pt-2">
      <div className="flex flex-wrap items-center gap-2.5">
        <DesignatorPlate designator={chip.designator} board="original" />
        <h2 className="!text-t3 font-normal">{chip.holds ?? "Memory chip"}, {sizeText(chip.sizeBytes)}</h2>
        <b className={`ml-auto flex items-center gap-1.5 ${chip.verified ? "text-green" : "text-ink-2"}`}><Mark kind={chip.verified ? "ok" : "run"} className="[--hole:var(--sheet)]" />{chip.verified ? "Verified" : chip.stateLabel}</b>
      </div>
      {chip.cells ? (
        <div className="sheet-strips">
          <span>{chip.composite ? `Put together from ${countOf(chip.composite.reads, "read")}` : "Read from your board"}</span><StripSvg cells={chip.cells} height={22} />
          {chip.verified && both ? (
            <Fragment>
              <span className="text-green">equal in all {countOf(chip.sizeBytes, "byte")}</span><LaneSvg counts={null} length={chip.cells.length} height={8} />
              <span>{moved ? "Read on the donor board" : "Read back from the donor"}</span><StripSvg cells={chip.cells} height={22} />
            </Fragment>
          ) : null}
        </div>
      ) : null}
      {chip.composite ? <p className="flex items-start gap-2"><Mark kind="caution" className="mt-px shrink-0 text-caution [--hole:var(--sheet)]" /><span><b>This image is a composite.</b> {compositeSentences(chip)}</span></p> : null}
      <dl className="sheet-facts">
        {chip.composite
          ? <Fact term="Put together from">{countOf(chip.composite.reads, "read")}, in {countOf(chip.composite.seatings, "seating")}</Fact>
          : <Fact term="Reads that agree">{seatingsText(chip)}{read ? <span className="block font-normal">{read}</span> : null}</Fact>}
        <Fact term="Approved">{chip.approvedAt ? `${dayText(chip.approvedAt, timeZone)}${chip.approvedBy ? `, ${chip.approvedBy}` : ""}` : "not yet"}</Fact>
        <Fact term={moved ? "Chip moved" : "Written"}>{chip.transferredAt ? dayText(chip.transferredAt, timeZone) : "not yet"}</Fact>
        <Fact term="Equal read-backs">{chip.readBacks}</Fact>
        <Fact term="CRC-32" mono>{chip.crc32?.toUpperCase() ?? "none yet"}</Fact>
        <Fact term="SHA-256 of the image" whole>{chip.sha256 ? <DigestInFull sha256={chip.sha256} /> : "none yet: no image is approved"}</Fact>
      </dl>
    </section>
  );
}
