import Link from "next/link";
import { Digest } from "@/components/ui/digest";
import { Mark } from "@/components/ui/mark";
import { DesignatorPlate } from "@/components/ui/plate";
import type { FindHit } from "@/lib/views";

/** Reads that hold an image: drive, chip and read, each a link. */
export function FindHits({ hits, caption }: { hits: readonly FindHit[]; caption: string }) {
  return (
    <table className="ruled lines">
      <caption className="sr-only">{caption}</caption>
      <thead><tr><th scope="col">Read</th><th scope="col">Chip</th><th scope="col">Case and drive</th><th scope="col">CRC-32</th><th scope="col">SHA-256</th><th scope="col">State</th></tr></thead>
      <tbody>
        {hits.map((hit) => (
          <tr key={hit.readId} className={hit.counted ? "" : "is-aside"}>
            <th scope="row"><Link href={`/chips/${hit.chipId}`}>{hit.readName}</Link></th>
            <td><DesignatorPlate designator={hit.designator} board={hit.boardRole} word /></td>
            <td><Link href={`/cases/${hit.caseId}`}>{hit.caseRef}</Link>, Drive {hit.driveLetter}</td>
            <td data-l="CRC-32"><code>{hit.crc32.toUpperCase()}</code></td>
            <td data-l="SHA-256"><Digest sha256={hit.sha256} /></td>
            <td><Mark kind={hit.counted ? "ok" : "aside"} className="[--hole:var(--paper)]" /> {hit.counted ? "Counted" : "Set aside"}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
