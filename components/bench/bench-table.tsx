import type { ToReceiveRow } from "@/lib/views";
import { BenchLine } from "./bench-line";
import type { BenchGroup } from "./bench-words";
import { ReceiveRows } from "./receive-rows";

const HEADS = ["Due", "Case", "Customer, part number", "Chip", "Do this next", "With", "Image"];

/** One table with row groups, in the order of the route. */
export function BenchTable({ groups, toReceive, acts, signs, now, timeZone }: { groups: readonly BenchGroup[]; toReceive: readonly ToReceiveRow[]; acts: boolean; signs: boolean; now: string; timeZone: string }) {
  return (
    <table className="queue">
      <caption className="sr-only">Work on the bench, by what has to be done next</caption>
      <thead>
        <tr>
          <th scope="col"><span className="sr-only">What has to be done</span></th>
          {HEADS.map((head) => <th key={head} scope="col">{head}</th>)}
          <th scope="col"><span className="sr-only">Open</span></th>
        </tr>
      </thead>
      <ReceiveRows rows={toReceive} acts={acts} now={now} />
      {groups.filter((group) => group.rows.length > 0).map((group) => (
        <tbody key={group.key} id={group.key}>
          {group.rows.map((row, i) => (
            <tr key={row.chip.id} className={i === 0 ? "first" : ""}>
              {i === 0 ? (
                <th scope="rowgroup" rowSpan={group.rows.length}>
                  <span className="text-t4 leading-[1.375rem] font-bold">{group.label}</span>
                  <span className="mt-0.5 text-t2 text-ink-2">{group.note}</span>
                </th>
              ) : null}
              <BenchLine row={row} acts={acts} signs={signs} timeZone={timeZone} />
            </tr>
          ))}
        </tbody>
      ))}
    </table>
  );
}
