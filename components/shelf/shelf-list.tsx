"use client";

import Link from "next/link";
import { useMemo } from "react";
import { ButtonLink } from "@/components/ui/button";
import { columnsFor, DataTable } from "@/components/ui/data-table";
import { Empty } from "@/components/ui/empty";
import { FindingLine } from "@/components/ui/finding-line";
import { dayText } from "@/components/ui/times";
import { boardName } from "@/lib/core/board-name";
import type { ShelfList as List, ShelfRow, ShelfState } from "@/lib/core/shelf";
import { STATE_MARK, stateWords } from "./shelf-words";

const column = columnsFor<ShelfRow>();
const NONE: Record<ShelfState, string> = { "on-shelf": "No board lies free on the shelf.", reserved: "No board is reserved.", taken: "No board was taken yet.", retired: "No board is retired." };
const PHONE = { board: "bare l-top", markings: "l-full", chips: "l-row", state: "bare l-row" };

/** The shelf: searched, sorted and paged by the database. */
export function ShelfTable({ list, sort, order, q, state, timeZone, changes }: { list: List; sort: string; order: "asc" | "desc"; q: string; state: ShelfState | ""; timeZone: string; changes: boolean }) {
  const columns = useMemo(() => column.columns([
    column.accessor("number", { id: "number", header: "Number", cell: ({ row }) => <Link className="font-mono whitespace-nowrap" href={`/shelf/${row.original.id}`}>{row.original.number}</Link> }),
    column.accessor("boardNumber", { id: "board", header: "Board", cell: ({ row }) => <span className="font-mono [overflow-wrap:anywhere]">{boardName(row.original)}</span> }),
    column.display({ id: "markings", header: "Controller, motor driver", enableSorting: false, cell: ({ row: { original: row } }) => <span className="font-mono text-t2">{row.controllerMarking ?? <span className="font-face text-ink-3">not read</span>}, {row.motorDriverMarking ?? <span className="font-face text-ink-3">not read</span>}</span> }),
    column.display({ id: "chips", header: "Chips", enableSorting: false, cell: ({ row }) => (row.original.chips.length > 0 ? <span className="font-mono text-t2">{row.original.chips.map((chip) => chip.designator).join(", ")}</span> : <span className="text-ink-3">none on record</span>) }),
    column.accessor("origin", { id: "origin", header: "Origin", cell: ({ row }) => row.original.origin ?? <span className="text-ink-3">not said</span> }),
    column.accessor("place", { id: "place", header: "Place", cell: ({ row }) => row.original.place ?? <span className="text-ink-3">not said</span> }),
    column.display({ id: "state", header: "State", enableSorting: false, cell: ({ row }) => <FindingLine kind={STATE_MARK[row.original.state]}>{stateWords(row.original)}</FindingLine> }),
    column.accessor("createdAt", { id: "recorded", header: "Recorded", cell: ({ row }) => <span className="whitespace-nowrap">{dayText(row.original.createdAt, timeZone)}</span> }),
  ]), [timeZone]);
  const all = <ButtonLink href="/shelf">Show the whole shelf</ButtonLink>;
  const empty = q ? <Empty title={`No board of the shelf fits “${q}”.`} action={all}>The search looks at numbers, markings, chips, origin, place, condition and note, at case numbers, and at the SHA-256 of contents saved from boards that were taken.</Empty>
    : state ? <Empty title={NONE[state]} action={all}>The other boards are in the whole list.</Empty>
    : <Empty title="The shelf is empty.">{changes ? "Put the first donor board on it, or import a list as CSV." : "A technician or a lead puts the first board on it."}</Empty>;
  return <DataTable caption="Donor shelf" columns={columns} list={list} sort={sort} order={order} rowId={(row) => row.id} empty={empty} phone={PHONE} rowClass={(row) => (row.state === "taken" || row.state === "retired" ? "is-aside" : "")} />;
}
