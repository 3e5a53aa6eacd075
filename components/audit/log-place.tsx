import Link from "next/link";
import type { ChainPlace } from "@/lib/core/audit-rows";

/** Where an entry stands, as a link to it in its log. */
export function LogPlace({ place, seq }: { place: ChainPlace; seq?: number }) {
  const at = seq === undefined ? "" : `#entry-${seq}`;
  if (place.workshop) return <Link href={`/custody/workshop${at}`}>Workshop{seq === undefined ? "" : `, entry ${seq}`}</Link>;
  if (!place.driveId) return <span className="[overflow-wrap:anywhere]">No known drive <code>{place.chainId}</code></span>;
  return <Link className="whitespace-nowrap" href={`/drives/${place.driveId}/custody${at}`}><span className="font-mono">{place.caseRef}</span> Drive {place.letter}{seq === undefined ? "" : `, entry ${seq}`}</Link>;
}
