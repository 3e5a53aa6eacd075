import Link from "next/link";
import { compositeWords } from "@/components/composite/composite-words";
import { waitsText } from "@/components/note/note-words";
import { StripThumb } from "@/components/strip/strip-thumb";
import { ButtonLink } from "@/components/ui/button";
import { Mark } from "@/components/ui/mark";
import { DesignatorPlate } from "@/components/ui/plate";
import { dayText, dueText } from "@/components/ui/times";
import { countOf } from "@/lib/core/quantity";
import type { BenchRow } from "@/lib/views";
import { atTheDonor, decides, rowAction, stepAndReason } from "./bench-words";

function Due({ row }: { row: BenchRow }) {
  return (
    <td className={`due ${row.late ?? ""}`}>
      {row.late ? <Mark kind={row.late === "late" ? "block" : "caution"} className="[--hole:var(--paper)]" /> : null}
      <span>
        <b>{row.dueOn ? dueText(row.dueOn) : "No date"}</b>
        {row.late === "late" ? <small>{countOf(row.lateDays, "day")} late</small> : row.late === "today" ? <small>today</small> : null}
      </span>
    </td>
  );
}

/** The cells of one chip in the queue; the row itself brings the group's title where it is the first. */
export function BenchLine({ row, acts, signs, timeZone }: { row: BenchRow; acts: boolean; signs: boolean; timeZone: string }) {
  const decide = decides(row, signs);
  const action = decide ? { word: "Decide", href: `/chips/${row.chip.id}/decision` } : rowAction(row, acts);
  const { step, reason } = stepAndReason(decide ? row.next.replace(/Ask a lead.*$/, "Sign the decision sheet, or send the image back.") : row.next);
  const donor = atTheDonor(row.chip.state.state) ? row.chip.pair : null;
  return (
    <>
      <Due row={row} />
      <td className="case"><Link href={`/cases/${row.caseId}`}>{row.caseRef}</Link></td>
      <td className="drv"><span>{row.customerName}</span><small className="font-mono">{row.partNumber}</small></td>
      <td className="chp"><DesignatorPlate designator={donor?.designator ?? row.chip.designator} board={donor ? "donor" : "original"} word /></td>
      <td className="nxt">{step}{reason ? <small>{reason}</small> : null}{row.nextWhy ? <small>{row.nextWhy}</small> : null}{row.hold ? <small className="held"><Mark kind="wait" size={12} /> {waitsText(row.hold)} since {dayText(row.hold.since, timeZone)}: {row.hold.reason}</small> : null}</td>
      <td className="with">{row.with}</td>
      <td className="img"><StripThumb thumbnail={row.chip.thumbnail} />{row.chip.composite ? <small>{compositeWords(row.chip.composite)}</small> : null}</td>
      <td className="act"><ButtonLink size="small" href={action.href} aria-label={`${action.word}: ${row.chip.designator} of case ${row.caseRef}`}>{action.word}</ButtonLink></td>
    </>
  );
}
