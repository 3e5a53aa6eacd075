"use client";

import { useMemo, type ReactNode } from "react";
import { columnsFor, DataTable } from "@/components/ui/data-table";
import { Digest } from "@/components/ui/digest";
import { FindingLine } from "@/components/ui/finding-line";
import { exactText } from "@/components/ui/times";
import { withCommas } from "@/lib/core/quantity";
import type { ChainRow } from "@/lib/core/audit-rows";
import { placeText } from "./audit-words";
import { CheckNow } from "./check-now";
import { LogPlace } from "./log-place";

const column = columnsFor<ChainRow>();

function LastCheck({ row, timeZone }: { row: ChainRow; timeZone: string }) {
  const { check } = row;
  if (!check) return <FindingLine kind="wait"><span className="text-ink-2">Not checked yet</span></FindingLine>;
  const when = <span className="block text-t2 text-ink-2">{exactText(check.at, timeZone)}, {withCommas(check.entries)} {check.entries === 1 ? "entry" : "entries"}</span>;
  if (check.findings === 0) return <FindingLine kind="ok">Clean{when}</FindingLine>;
  return <FindingLine kind="block">{check.first ?? "Something was found."}{check.findings > 1 ? ` And ${withCommas(check.findings - 1)} more.` : ""}{when}</FindingLine>;
}

/** Every log with its head and its last check. */
export function ChainList({ list, sort, order, timeZone, empty }: {
  list: { items: ChainRow[]; total: number; page: number; pageSize: number };
  sort: string;
  order: "asc" | "desc";
  timeZone: string;
  empty: ReactNode;
}) {
  const columns = useMemo(() => column.columns([
    column.accessor("caseRef", { id: "case", header: "Log", cell: ({ row }) => <><LogPlace place={row.original} />{row.original.label ? <span className="block font-mono text-t2 font-normal text-ink-2 [overflow-wrap:anywhere]">{row.original.label}</span> : null}</> }),
    column.accessor("entries", { id: "entries", header: "Entries", cell: ({ row }) => withCommas(row.original.entries) }),
    column.display({ id: "head", header: "Head", enableSorting: false, cell: ({ row }) => (row.original.hash && row.original.entries > 0 ? <Digest sha256={row.original.hash} /> : <FindingLine kind={row.original.driveId || row.original.workshop ? "wait" : "block"}>no head</FindingLine>) }),
    column.accessor("lastAt", { id: "latest", header: "Latest entry", cell: ({ row }) => <span className="whitespace-nowrap">{row.original.lastAt ? exactText(row.original.lastAt, timeZone) : "none"}</span> }),
    column.display({ id: "checked", header: "Last check", enableSorting: true, cell: ({ row }) => <LastCheck row={row.original} timeZone={timeZone} /> }),
    column.display({ id: "now", header: () => <span className="sr-only">Check now</span>, enableSorting: false, cell: ({ row }) => <span className="block text-right phone:text-left"><CheckNow chainId={row.original.chainId} name={placeText(row.original)} /></span> }),
  ]), [timeZone]);
  return (
    <DataTable caption="Custody logs with their last check" columns={columns} list={list} sort={sort} order={order} rowId={(row) => row.chainId} empty={empty} numeric={["entries"]}
      phone={{ checked: "bare l-full", head: "bare", latest: "l-row", now: "bare l-row" }} rowClass={(row) => (row.check && row.check.findings > 0 ? "is-odd" : "")} />
  );
}
