import Link from "next/link";
import { Digest } from "@/components/ui/digest";
import { PastTheEnd, Pages } from "@/components/ui/pages";
import { exactText } from "@/components/ui/times";
import type { CustodyHeadRow, ListView } from "@/lib/views";

/** Where the chain of every drive stands, the newest case first. */
export function HeadList({ list, timeZone }: { list: ListView<CustodyHeadRow>; timeZone: string }) {
  const pages = { total: list.total, page: list.page, pageSize: list.pageSize, href: (page: number) => `/custody?page=${page}` };
  if (list.items.length === 0) return <PastTheEnd {...pages} />;
  return (
    <>
      <div className="overflow-x-auto phone:overflow-visible">
        <table className="ruled lines">
          <caption className="sr-only">Custody logs, one for each drive</caption>
          <thead><tr><th scope="col">Case</th><th scope="col">Drive</th><th scope="col" className="num">Entries</th><th scope="col">Latest entry</th><th scope="col">Hash of the latest</th><th scope="col"><span className="sr-only">Open</span></th></tr></thead>
          <tbody>
            {list.items.map((row) => (
              <tr key={row.driveId}>
                <th scope="row"><Link className="font-mono" href={`/cases/${row.caseId}`}>{row.caseRef}</Link></th>
                <td><Link href={`/drives/${row.driveId}`}>Drive {row.letter}</Link> <span className="font-mono">{row.label}</span></td>
                <td className="num" data-l="Entries">{row.entries}</td>
                <td data-l="Latest" className="whitespace-nowrap">{row.lastAt ? exactText(row.lastAt, timeZone) : "none"}</td>
                <td>{row.hash ? <Digest sha256={row.hash} /> : null}</td>
                <td className="text-right"><Link href={`/drives/${row.driveId}/custody`}>Open the log<span className="sr-only"> of Drive {row.letter}, case {row.caseRef}</span></Link></td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <Pages {...pages} />
    </>
  );
}
