import Link from "next/link";
import { ButtonLink } from "@/components/ui/button";
import { momentText } from "@/components/ui/times";
import type { ToReceiveRow } from "@/lib/views";

/** What was asked for and is not here yet. */
export function ToReceiveTable({ rows, timeZone }: { rows: readonly ToReceiveRow[]; timeZone: string }) {
  if (rows.length === 0) return <p className="text-ink-2">Nothing is on its way: every request’s parcel is here.</p>;
  return (
    <table className="ruled lines">
      <caption className="sr-only">Requests whose parcel is not here yet</caption>
      <thead><tr><th scope="col">Case</th><th scope="col">Customer</th><th scope="col">Part number</th><th scope="col">Damage</th><th scope="col">Asked on</th><th scope="col"><span className="sr-only">Open</span></th></tr></thead>
      <tbody>
        {rows.map((row) => (
          <tr key={row.caseId}>
            <th scope="row"><Link href={`/cases/${row.caseId}`} className="font-mono">{row.caseRef}</Link></th>
            <td className="[overflow-wrap:anywhere]">{row.customerName}</td>
            <td className="font-mono [overflow-wrap:anywhere]">{row.partNumber ?? "not given"}</td>
            <td className="max-w-[44ch] [overflow-wrap:anywhere]">{row.damage.length > 120 ? `${row.damage.slice(0, 120).trimEnd()} …` : row.damage}</td>
            <td className="whitespace-nowrap">{momentText(row.requestedAt, timeZone)}</td>
            <td className="l-row"><ButtonLink size="small" href={`/receive/${row.caseId}`} aria-label={`Receive case ${row.caseRef}`}>Receive</ButtonLink></td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
