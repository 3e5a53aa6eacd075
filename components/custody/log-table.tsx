"use client";

import { Fragment, useMemo, useState } from "react";
import { Button } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import type { CustodyEntryView } from "@/lib/views";
import { LogFilterBar } from "./log-filter-bar";
import { LogLine } from "./log-line";
import { gapsOf, keeps, WHOLE_LOG } from "./log-words";
import { useComeTo, useLogFilter } from "./use-log-filter";

/** The chain as one trace through vias, newest first. A broken link leaves a gap; what the filter hides is dotted. */
export function LogTable({ entries, timeZone, against = [], show }: {
  /** the whole chain, oldest first */
  entries: readonly CustodyEntryView[];
  timeZone: string;
  /** numbers of entries that the check names */
  against?: readonly number[];
  /** an entry to come to, whatever the filter hides; a new object each time it is asked for */
  show?: { seq: number } | null;
}) {
  const { filter, setFilter } = useLogFilter();
  const [open, setOpen] = useState<ReadonlySet<number>>(new Set());
  const gaps = useMemo(() => gapsOf(entries), [entries]);
  const before = useMemo(() => new Map(entries.map((entry, i) => [entry.seq, entries[i - 1]?.seq ?? null])), [entries]);
  const shown = entries.filter((entry) => keeps(entry, filter)).reverse();
  const toggle = (seq: number) => setOpen((now) => {
    const next = new Set(now);
    if (!next.delete(seq)) next.add(seq);
    return next;
  });

  useComeTo(show ?? null, setFilter);

  return (
    <>
      <LogFilterBar entries={entries} shown={shown.length} filter={filter} onChange={setFilter} />
      {shown.length === 0 ? (
        <Empty title="No entry fits this choice." action={<Button onClick={() => setFilter(WHOLE_LOG)}>Show the whole log</Button>}>The log has {entries.length} entries.</Empty>
      ) : (
        <div className="overflow-x-auto phone:overflow-visible">
          <table className="ruled logx">
            <caption className="sr-only">Entries of the custody log, newest first</caption>
            <thead>
              <tr>
                <th className="w-[30px]"><span className="sr-only">Link</span></th>
                {["No.", "Time", "Who", "What happened", "Where", "Hash of the one before", "Hash"].map((head) => <th key={head} scope="col">{head}</th>)}
              </tr>
            </thead>
            <tbody>
              {shown.map((entry, i) => {
                const below = shown[i + 1];
                const gap = gaps.get(entry.seq);
                const hidden = below ? before.get(entry.seq) !== below.seq : before.get(entry.seq) !== null;
                const trace = `${i === 0 ? "trace-first" : ""} ${below ? "" : "trace-last"} ${gap ? "trace-cut" : hidden && below ? "trace-hidden" : ""}`;
                return (
                  <Fragment key={entry.seq}>
                    <LogLine entry={entry} timeZone={timeZone} trace={trace} against={against.includes(entry.seq)} open={open.has(entry.seq)} onToggle={() => toggle(entry.seq)} full />
                    {gap ? <tr className="log-gap"><td className="via" /><td colSpan={7}>{gap}</td></tr> : null}
                  </Fragment>
                );
              })}
            </tbody>
          </table>
        </div>
      )}
    </>
  );
}
