"use client";

import Link from "next/link";
import { useMemo } from "react";
import { stateMark } from "@/components/chip/chip-words";
import { ButtonLink } from "@/components/ui/button";
import { columnsFor, DataTable } from "@/components/ui/data-table";
import { Empty } from "@/components/ui/empty";
import { FindingLine } from "@/components/ui/finding-line";
import { dayText, dueText } from "@/components/ui/times";
import type { CaseRow, ListView } from "@/lib/views";
import type { ShownState } from "./case-search";

const column = columnsFor<CaseRow>();
const NONE: Record<Exclude<ShownState, "">, string> = { requested: "No parcel is awaited.", open: "No case is open.", closed: "No case is closed.", "erasure-due": "No case is due for erasure." };
const PHONE = { customer: "bare l-top", damage: "bare l-full", drives: "bare l-row", chips: "bare l-row" };

function Chips({ row }: { row: CaseRow }) {
  if (row.state === "closed") return <span className="text-ink-2">Closed{row.erasedOn ? <span className="block text-t2">Images erased on {dueText(row.erasedOn)} {row.erasedOn.slice(0, 4)}</span> : row.eraseOn ? <span className="block text-t2">Images due for erasure on {dueText(row.eraseOn)} {row.eraseOn.slice(0, 4)}</span> : null}</span>;
  if (row.state === "requested") return <FindingLine kind="wait">Requested, parcel not here yet</FindingLine>;
  if (row.chips.length === 0) return <span className="text-ink-3">{row.noChipToMove ? "No chip to move" : "No chip recorded yet"}</span>;
  return <>{row.chips.map((chip, i) => <FindingLine key={i} kind={stateMark(chip.state)}><span className="font-mono">{chip.designator}</span> {chip.label}</FindingLine>)}</>;
}

/** The cases: searched, sorted and paged by the database. */
export function CaseList({ list, sort, order, q, state, timeZone, today, records }: {
  list: ListView<CaseRow>;
  sort: string;
  order: "asc" | "desc";
  q: string;
  state: ShownState;
  timeZone: string;
  /** the workshop's calendar day */
  today: string;
  records: boolean;
}) {
  const columns = useMemo(() => column.columns([
    column.accessor("ref", { id: "ref", header: "Case", cell: ({ row }) => <Link className="font-mono" href={`/cases/${row.original.id}`}>{row.original.ref}</Link> }),
    column.accessor("customerName", { id: "customer", header: "Customer", cell: ({ row }) => <span className="[overflow-wrap:anywhere]">{row.original.customerName}</span> }),
    column.accessor("partNumbers", { id: "drives", header: "Drives", enableSorting: false, cell: ({ row }) => <span className="font-mono [overflow-wrap:anywhere]">{row.original.partNumbers}</span> }),
    column.accessor("damage", { id: "damage", header: "Damage", enableSorting: false, cell: ({ row }) => <span className="line-clamp-2 max-w-[36ch]">{row.original.damage}</span> }),
    column.accessor("dueOn", {
      id: "due", header: "Due", cell: ({ row: { original: row } }) => {
        if (!row.dueOn) return <span className="text-ink-3">no date</span>;
        const late = row.state === "open" && row.dueOn < today;
        return <span className={`whitespace-nowrap ${late ? "font-strong text-block" : ""}`}>{dueText(row.dueOn)}{late ? ", late" : row.state === "open" && row.dueOn === today ? ", today" : ""}</span>;
      },
    }),
    column.accessor("receivedAt", { id: "received", header: "Received", cell: ({ row }) => <span className="whitespace-nowrap">{row.original.receivedAt ? dayText(row.original.receivedAt, timeZone) : "not yet"}</span> }),
    column.display({ id: "chips", header: "Chips", enableSorting: false, cell: ({ row }) => <Chips row={row.original} /> }),
  ]), [timeZone, today]);
  const empty = q
    ? <Empty title={`No case fits “${q}”.`} action={<ButtonLink href="/cases">Show all cases</ButtonLink>}>The search looks at case number, customer, damage and the drives’ part numbers, models and serials.</Empty>
    : state
    ? <Empty title={NONE[state]} action={<ButtonLink href="/cases">Show all cases</ButtonLink>}>{state === "requested" ? "Customers ask on the public form, /request. What they sent waits here until its parcel comes." : state === "erasure-due" ? "A closed case stands here from the day on which its images may be erased. Nothing is erased by itself." : "The other cases are in the whole list."}</Empty>
    : <Empty title="No case yet." action={records ? <ButtonLink href="/cases/new">Record a case</ButtonLink> : null}>{records ? "Record the first one; then its drive, boards and chips." : "A technician or a lead records the first one."}</Empty>;
  return <DataTable caption="Cases" columns={columns} list={list} sort={sort} order={order} rowId={(row) => row.id} empty={empty} phone={PHONE} rowClass={(row) => (row.state === "closed" ? "is-aside" : "")} />;
}
