import Link from "next/link";
import { dueText } from "@/components/ui/times";
import type { CaseRow } from "@/lib/views";

export function FindCases({ cases }: { cases: readonly CaseRow[] }) {
  return (
    <table className="ruled lines">
      <caption className="sr-only">Cases that match</caption>
      <thead><tr><th scope="col">Case</th><th scope="col">Customer</th><th scope="col">Drives</th><th scope="col">Chips</th><th scope="col">Due</th></tr></thead>
      <tbody>
        {cases.map((row) => (
          <tr key={row.id}>
            <th scope="row"><Link href={`/cases/${row.id}`}>{row.ref}</Link>{row.state === "closed" ? <span className="font-normal text-ink-2"> closed</span> : null}</th>
            <td className="[overflow-wrap:anywhere]">{row.customerName}</td>
            <td data-l="Drives" className="font-mono [overflow-wrap:anywhere]">{row.partNumbers || "none yet"}</td>
            <td>{row.chips.length > 0 ? row.chips.map((c) => `${c.designator}: ${c.label}`).join(", ") : "none yet"}</td>
            <td data-l="Due">{row.dueOn ? dueText(row.dueOn) : "no date"}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
