"use client";

import { useMemo, useState } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { FindingLine } from "@/components/ui/finding-line";
import type { MarkKind } from "@/components/ui/mark";
import { countOf, withCommas } from "@/lib/core/quantity";
import { address } from "@/lib/core/strip";
import type { VotesView } from "@/lib/views";
import { columnsOf, type Standing, STANDING_WORD } from "./composite-words";

const FIRST_SHOWN = 32;
const MORE = 256;
const STANDING_MARK: Record<Standing, MarkKind> = { firm: "ok", weak: "caution", constructed: "block", undecided: "block" };
const LEAST_SURE_FIRST: readonly Standing[] = ["undecided", "constructed", "weak", "firm"];
const hex = (byte: number) => byte.toString(16).toUpperCase().padStart(2, "0");

/** Who voted what, byte by byte. The least sure come first: that is what a lead has to look at. */
export function DisputedTable({ votes, sizeBytes }: { votes: VotesView; sizeBytes: number }) {
  const [shown, setShown] = useState(FIRST_SHOWN);
  const columns = columnsOf(votes);
  // up to 10,000 bytes: sorted once, not at every "Show more"
  const rows = useMemo(() => [...votes.disputed].sort((a, b) => LEAST_SURE_FIRST.indexOf(a.standing) - LEAST_SURE_FIRST.indexOf(b.standing) || a.at - b.at), [votes.disputed]);
  const rest = rows.length - shown;
  return (
    <div className="grid gap-2.5">
      <div className="overflow-x-auto">
        <table className="ruled">
          <caption className="sr-only">Disputed bytes: the value in each read, the chosen value and what it rests on</caption>
          <thead>
            <tr>
              <th scope="col">Address</th>
              {columns.map((column) => <th key={column.place} scope="col">{column.name}<span className="block font-normal">seating {column.seating}</span></th>)}
              <th scope="col">Chosen</th>
              <th scope="col">Held by</th>
              <th scope="col">Margin</th>
              <th scope="col">Standing</th>
            </tr>
          </thead>
          <tbody>
            {rows.slice(0, shown).map((byte) => (
              <tr key={byte.at}>
                <th scope="row" className="whitespace-nowrap"><code>{address(byte.at, sizeBytes)}</code></th>
                {columns.map(({ place }) => {
                  const agrees = byte.values[place] === byte.chosen;
                  return <td key={place}><code className={agrees ? "text-ink-2" : "font-semibold text-block underline"}>{hex(byte.values[place])}</code>{agrees ? null : <span className="sr-only"> differs</span>}</td>;
                })}
                <td><code className="font-semibold">{hex(byte.chosen)}</code></td>
                <td className="whitespace-nowrap">{byte.support} of {columns.length}</td>
                <td>{byte.margin}</td>
                <td className="min-w-[15ch]"><FindingLine kind={STANDING_MARK[byte.standing]}>{STANDING_WORD[byte.standing]}</FindingLine></td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      {rest > 0 ? (
        <Buttons>
          <Button size="small" onClick={() => setShown(shown + MORE)}>Show {withCommas(Math.min(MORE, rest))} more</Button>
          <span className="text-ink-2">{withCommas(shown)} of {countOf(rows.length, "byte")} shown, the least sure first.</span>
        </Buttons>
      ) : null}
      {votes.truncated ? <p className="text-ink-2">The list is kept to {countOf(rows.length, "byte")}; the counts are of all.</p> : null}
    </div>
  );
}
