"use client";

import Link from "next/link";
import { useState } from "react";
import { boardName } from "@/lib/core/board-name";
import { cellWords } from "@/components/strip/cell-words";
import { nextDifference, StripGrid } from "@/components/strip/strip-grid";
import { Digest } from "@/components/ui/digest";
import { Empty } from "@/components/ui/empty";
import { momentText } from "@/components/ui/times";
import { countOf } from "@/lib/core/quantity";
import type { DecisionView, StripStackView } from "@/lib/views";

/** The image over the donor's own content, and what of it is saved. */
export function WhereItGoes({ view, timeZone }: { view: DecisionView; timeZone: string }) {
  const { chip, donor, stack } = view;
  if (!donor) return <Empty title="No donor chip is paired.">Record the donor’s chip on its board and pair it with {chip.designator}. <Link href={`/cases/${chip.case.id}`}>Open case {chip.case.ref}</Link></Empty>;
  const own = donor.own.at(0);
  const said = donor.own.map((r) => `${r.operator.name}, ${momentText(r.storedAt, timeZone)}`).join("; ");
  return (
    <>
      {stack ? <Strips stack={stack} donor={donor.chip.designator} /> : <Empty title="Nothing to draw yet.">The strips appear when the image and the donor’s own content are both stored and sound.</Empty>}
      <div className="mt-3 flex flex-wrap gap-x-6 gap-y-1 bg-well px-3 py-2 text-t2">
        {own ? (
          <>
            <span>Saved own content: SHA-256 <Digest sha256={own.sha256} /></span>
            <span>CRC-32 <code>{own.crc32.toUpperCase()}</code></span>
            <span>{donor.own.length === 1 ? "1 read" : countOf(donor.own.length, "read")}: {said}</span>
          </>
        ) : <span>The donor’s own content isn’t saved yet. <Link href={`/chips/${donor.chip.id}`}>Open donor {donor.chip.designator}</Link></span>}
      </div>
    </>
  );
}

function Strips({ stack, donor }: { stack: StripStackView; donor: string }) {
  const [cell, setCell] = useState<number | null>(() => nextDifference(stack, -1, 1));
  const words = cell === null ? null : cellWords(stack, cell, stack.sizeBytes);
  return (
    <div className="strips">
      <p className="sr-only">The strip of the image, to be written, over the strip of what donor {donor} holds now. {countOf(stack.lanes[0]?.differingBytes ?? 0, "byte")} differ.</p>
      <StripGrid view={stack} sizeBytes={stack.sizeBytes} label="The image over the donor’s own content. Arrow keys move by one cell, N and P go to the next and previous difference." cursor={cell} onCursor={setCell} onOpen={(at) => setCell(Math.floor(at / stack.cellBytes))} />
      {words ? (
        <div className="readout no-print" aria-live="off">
          <span>Cell <code className="font-semibold">{words.span}</code></span><span>{words.says}</span>
          <b className={words.differs === "equal" ? "text-green" : "text-block"}>{words.differs}</b>
        </div>
      ) : null}
    </div>
  );
}

/** Side facts of the donor, each with whether it equals the original's. */
export function DonorFacts({ view: { chip, donor } }: { view: DecisionView }) {
  if (!donor) return null;
  const supply = (mv: number | null) => (mv === null ? "unknown" : `${mv / 1000} V`);
  const facts = [
    { term: "Size and bus", value: `${donor.chip.sizeBytes.toLocaleString("en-GB")} bytes, ${donor.chip.bus.toUpperCase()}`, same: donor.chip.sizeBytes === chip.sizeBytes && donor.chip.bus === chip.bus },
    { term: "Supply", value: supply(donor.chip.supplyMillivolts), same: donor.chip.supplyMillivolts !== null && donor.chip.supplyMillivolts === chip.supplyMillivolts },
    { term: "Board", value: boardName(donor.board), same: donor.board.fit?.verdict === "fits" },
  ];
  return (
    <dl className="mt-3.5 grid gap-2 mid:grid-flow-col mid:justify-start mid:gap-x-8 phone:grid-flow-row">
      {facts.map((f) => (
        <div key={f.term}>
          <dt className="text-t1 text-ink-2">{f.term}</dt>
          <dd className="font-medium">{f.value} <span className={f.same ? "text-green" : "text-caution"}>{f.same ? "same" : "not the same"}</span></dd>
        </div>
      ))}
    </dl>
  );
}
