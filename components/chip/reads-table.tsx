"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { Digest } from "@/components/ui/digest";
import { DesignatorPlate } from "@/components/ui/plate";
import { momentText } from "@/components/ui/times";
import { readTitle } from "@/lib/core/derived";
import { may } from "@/lib/core/policy";
import { sizeText } from "@/lib/core/quantity";
import { seatingLetter, type Stage } from "@/lib/core/words";
import type { ChipView, ReadView, SessionView } from "@/lib/views";
import { ReadOrigin } from "./read-origin";
import { nameOf, oddReads } from "./chip-words";
import { ReadDialogs } from "./read-dialogs";
import { ReadFindings } from "./read-findings";
import type { ReadAction } from "./read-form";

const GROUPS: { stage: Stage; board: "original" | "donor"; words: string }[] = [
  { stage: "before", board: "original", words: "Original chip. Nothing is ever written to it." },
  { stage: "donor", board: "donor", words: "Donor chip’s own content, saved before any write." },
  { stage: "after", board: "donor", words: "Read back after the transfer, to be equal to the approved image." },
];
const HEADS = ["Read", "Seating", "Reader and adapter", "Operator", "Taken", "Size", "CRC-32", "SHA-256", "Findings"];

/** Every read, grouped by what it is of; what is set aside stays in the list, with its reason. */
export function ReadsTable({ chip, user, timeZone, onChanged }: { chip: ChipView; user: SessionView["user"]; timeZone: string; onChanged(): Promise<unknown> }) {
  const [asked, setAsked] = useState<{ read: ReadView; action: ReadAction } | null>(null);
  const donor = chip.boardRole === "donor" ? chip.designator : chip.pair?.designator ?? chip.designator;
  const original = chip.boardRole === "original" ? chip.designator : chip.pair?.designator ?? chip.designator;
  return (
    <>
      <div className="overflow-x-auto phone:overflow-visible print:overflow-visible">
        <table className="ruled lines">
          <caption className="sr-only">Reads of {chip.designator}</caption>
          <thead><tr>{HEADS.map((head) => <th key={head} scope="col" className={head === "Size" ? "num" : ""}>{head}</th>)}<th scope="col"><span className="sr-only">What can be done</span></th></tr></thead>
          {GROUPS.map((group) => {
            const reads = chip.reads.filter((r) => r.stage === group.stage);
            if (reads.length === 0) return null;
            const odd = oddReads(chip.reads, group.stage);
            return (
              <tbody key={group.stage}>
                <tr className="grp"><th colSpan={10} scope="colgroup"><DesignatorPlate designator={group.board === "original" ? original : donor} board={group.board} /> &nbsp;{group.words}</th></tr>
                {reads.map((read) => {
                  const stands = read.counted && (odd.includes(read) || read.findings.some((f) => f.severity === "blocks"));
                  return (
                    <tr key={read.id} id={`read-${read.id}`} className={read.setAside ? "is-aside" : stands ? "is-odd" : ""}>
                      <th scope="row"><span className="struck">{readTitle(read)}</span></th>
                      {read.derived ? null : <td data-l="Seating">{seatingLetter(read.seating)}</td>}
                      <td colSpan={read.derived ? 2 : 1} className={read.derived ? "l-full" : "min-w-[9.5rem] phone:min-w-0"}><ReadOrigin read={read} /></td>
                      <td className="whitespace-nowrap print:whitespace-normal">{read.operator.name}</td>
                      <td className="l-top whitespace-nowrap print:whitespace-normal">{momentText(read.takenAt ?? read.storedAt, timeZone)}</td>
                      <td className="num">{sizeText(read.sizeBytes)}</td>
                      <td data-l="CRC-32"><code>{read.crc32.toUpperCase()}</code></td>
                      <td className="l-row" data-l="SHA-256"><Digest sha256={read.sha256} /></td>
                      <td className="l-full print:min-w-[180px]"><ReadFindings chip={chip} read={read} /></td>
                      <td className="no-print"><ReadActions read={read} user={user} open={chip.case.open} onAsk={(action) => setAsked({ read, action })} /></td>
                    </tr>
                  );
                })}
              </tbody>
            );
          })}
        </table>
      </div>
      <ReadDialogs asked={asked} chip={chip} onClose={() => setAsked(null)} onChanged={onChanged} />
    </>
  );
}

function ReadActions({ read, user, open, onAsk }: { read: ReadView; user: SessionView["user"]; open: boolean; onAsk(action: ReadAction): void }) {
  const mayChange = open && may(user, "read.set-aside", { operatorId: read.operator.id });
  return (
    <span className="-my-1 flex items-center justify-end gap-x-3 whitespace-nowrap phone:justify-start">
      {mayChange ? <Button variant="text" size="small" aria-label={`${read.counted ? "Set aside" : "Count again"}: ${nameOf(read)}`} onClick={() => onAsk(read.counted ? "set-aside" : "count-again")}>{read.counted ? "Set aside…" : "Count again…"}</Button> : null}
      {may(user, "read.hand-out-any") && !read.erased ? <Button variant="text" size="small" aria-label={`Download ${nameOf(read)}`} onClick={() => onAsk("download")}>Download…</Button> : null}
    </span>
  );
}
