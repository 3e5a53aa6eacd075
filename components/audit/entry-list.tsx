"use client";

import { useMemo, type ReactNode } from "react";
import { columnsFor, DataTable } from "@/components/ui/data-table";
import { Digest } from "@/components/ui/digest";
import { FindingLine } from "@/components/ui/finding-line";
import { exactText } from "@/components/ui/times";
import { actionWord } from "@/lib/core/audit";
import type { AssessmentRow, AuditEntryRow } from "@/lib/core/audit-rows";
import { lengthText } from "./audit-words";
import { LogPlace } from "./log-place";

const column = columnsFor<AuditEntryRow | AssessmentRow>();
const PHONE = { what: "bare l-full", time: "bare", who: "bare", case: "bare l-row", digest: "bare l-row", to: "bare", reason: "bare l-row", covered: "l-row", clock: "bare l-row", action: "bare l-top" };

export type EntryColumn = "action" | "what" | "to" | "reason" | "digest" | "clock" | "covered";

const HEAD = { what: "What", to: "To", reason: "Reason", digest: "SHA-256", clock: "By how much", covered: "Findings it covered" } as const;

function cell(kind: EntryColumn, row: AuditEntryRow | AssessmentRow): ReactNode {
  switch (kind) {
    case "action": return actionWord(row.action);
    case "what": return row.what || row.sentence;
    case "to": return row.to ? <><span className="hidden phone:inline">to </span>{row.to}</> : null;
    case "reason": return <span className="block max-w-[60ch] whitespace-pre-wrap [overflow-wrap:anywhere]">{row.reason}</span>;
    case "digest": return row.digest ? <Digest sha256={row.digest} /> : null;
    case "clock": return <>{row.clockBehindMs === null ? null : <span className="block">clock back by {lengthText(row.clockBehindMs)}</span>}{row.headBehind === null ? null : <span className="block">head had been turned back to entry {row.headBehind}</span>}</>;
    case "covered": {
      const covered = "covered" in row ? row.covered : [];
      if (covered.length === 0) return <span className="text-ink-2">The log checks out now, or an earlier assessment covers it.</span>;
      return covered.slice(0, 6).map((finding, i) => <FindingLine key={i} kind="block">{finding.seq === null ? "The head" : `Entry ${finding.seq}`}: {finding.problem.replaceAll("-", " ")}</FindingLine>);
    }
  }
}

/** Entries of the logs by what they say, the newest first; each leads to its place in the log. */
export function EntryList({ list, caption, columns, sort, order, timeZone, empty, heads = {} }: {
  list: { items: (AuditEntryRow | AssessmentRow)[]; total: number; page: number; pageSize: number };
  caption: string;
  columns: readonly EntryColumn[];
  sort: string;
  order: "asc" | "desc";
  timeZone: string;
  empty: ReactNode;
  heads?: Partial<Record<EntryColumn, string>>;
}) {
  const wanted = columns.join(" ");
  const headText = JSON.stringify(heads);
  const made = useMemo(() => {
    const own = JSON.parse(headText) as Partial<Record<EntryColumn, string>>;
    return column.columns([
      column.accessor("at", { id: "time", header: "Time", cell: ({ row }) => <span className="whitespace-nowrap font-normal">{row.original.at ? exactText(row.original.at, timeZone) : "unknown time"}</span> }),
      column.accessor("who", { id: "who", header: "Who", cell: ({ row }) => <>{row.original.who || "unknown"}{row.original.role && row.original.role !== "system" ? <span className="text-ink-3">, {row.original.role}</span> : null}</> }),
      ...(wanted.split(" ") as EntryColumn[]).map((kind) => column.display({ id: kind, header: own[kind] ?? (kind === "action" ? "Step" : HEAD[kind]), enableSorting: kind === "action", cell: ({ row }) => cell(kind, row.original) })),
      column.accessor("caseRef", { id: "case", header: "Log", cell: ({ row }) => <><LogPlace place={row.original} seq={row.original.seq} />{row.original.trouble ? <FindingLine kind="block">{row.original.trouble}</FindingLine> : null}</> }),
    ]);
  }, [wanted, headText, timeZone]);
  return (
    <DataTable caption={caption} columns={made} list={list} sort={sort} order={order} rowId={(row) => `${row.chainId}-${row.seq}`} empty={empty}
      phone={PHONE} rowClass={(row) => (row.trouble ? "is-odd" : "")} />
  );
}
