import Link from "next/link";
import { entriesText } from "./entries-text";
import type { CustodyEntryView } from "@/lib/views";
import { LogLine } from "./log-line";

const SHOWN = 6;

/** The last six entries of one drive's chain, and the way to the rest. */
export function LatestEntries({ driveId, letter, entries, timeZone }: { driveId: string; letter: string; entries: readonly CustodyEntryView[]; timeZone: string }) {
  const latest = entries.slice(-SHOWN).reverse();
  return (
    <div className="pb-4 print:break-inside-avoid">
      <h3 className="pb-1 text-t3 font-strong">Drive {letter} <span className="font-normal text-ink-2">last {latest.length} of {entriesText(entries.length)}</span></h3>
      <div className="overflow-x-auto phone:overflow-visible print:overflow-visible">
        <table className="ruled logx">
          <caption className="sr-only">Latest entries of Drive {letter}</caption>
          <thead><tr><th className="w-[30px]"><span className="sr-only">Link</span></th>{["No.", "Time", "Who", "What happened", "Where", "Hash"].map((head) => <th key={head} scope="col">{head}</th>)}</tr></thead>
          <tbody>
            {latest.map((entry, i) => <LogLine key={entry.seq} entry={entry} timeZone={timeZone} trace={`${i === 0 ? "trace-first" : ""} ${i === latest.length - 1 && entry.seq === 1 ? "trace-last" : ""}`} against={false} open={false} full={false} />)}
          </tbody>
        </table>
      </div>
      <p className="no-print pt-2.5"><Link href={`/drives/${driveId}/custody`}>Whole log of Drive {letter}</Link></p>
    </div>
  );
}
