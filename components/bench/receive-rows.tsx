import Link from "next/link";
import { ButtonLink } from "@/components/ui/button";
import { dueText } from "@/components/ui/times";
import { countOf } from "@/lib/core/quantity";
import type { ToReceiveRow } from "@/lib/views";

const DAY_MS = 86_400_000;

function since(iso: string, now: string): string {
  const days = Math.floor((Date.parse(now) - Date.parse(iso)) / DAY_MS);
  return days < 1 ? "Asked today" : `Asked ${countOf(days, "day")} ago`;
}

/** What was asked for and is not here yet: the first group of the bench. There is no chip to name. */
export function ReceiveRows({ rows, acts, now }: { rows: readonly ToReceiveRow[]; acts: boolean; now: string }) {
  if (rows.length === 0) return null;
  return (
    <tbody id="to-receive">
      {rows.map((row, i) => (
        <tr key={row.caseId} className={i === 0 ? "first" : ""}>
          {i === 0 ? (
            <th scope="rowgroup" rowSpan={rows.length}>
              <span className="text-t4 leading-[1.375rem] font-bold">To receive</span>
              <span className="mt-0.5 text-t2 text-ink-2">Asked for, the parcel is not here yet</span>
            </th>
          ) : null}
          <td className="due"><span><b>{row.dueOn ? dueText(row.dueOn) : "No date"}</b></span></td>
          <td className="case"><Link href={`/cases/${row.caseId}`}>{row.caseRef}</Link></td>
          <td className="drv"><span>{row.customerName}</span><small className="font-mono">{row.partNumber ?? "no part number given"}</small></td>
          <td className="chp text-ink-2">whole drive</td>
          <td className="nxt">Receive the parcel when it comes.<small>{since(row.requestedAt, now)}. {row.neededBy && !row.dueOn ? `Needed by ${dueText(row.neededBy)}. ` : ""}{row.damage.length > 90 ? `${row.damage.slice(0, 90).replace(/\s+\S*$/, "")} …` : row.damage}</small></td>
          <td className="with">anyone</td>
          <td className="img" />
          <td className="act">{acts
            ? <ButtonLink size="small" href={`/receive/${row.caseId}`} aria-label={`Receive: case ${row.caseRef}`}>Receive</ButtonLink>
            : <ButtonLink size="small" href={`/cases/${row.caseId}`} aria-label={`Open: case ${row.caseRef}`}>Open</ButtonLink>}</td>
        </tr>
      ))}
    </tbody>
  );
}
