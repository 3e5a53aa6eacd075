"use client";

import { useMemo, type ReactNode } from "react";
import { columnsFor, DataTable } from "@/components/ui/data-table";
import { FindingLine } from "@/components/ui/finding-line";
import { exactText } from "@/components/ui/times";
import { END_WORD } from "@/lib/core/audit";
import type { SessionRow, TokenRow } from "@/lib/core/audit-rows";

interface Shown<Row> {
  list: { items: Row[]; total: number; page: number; pageSize: number };
  sort: string;
  order: "asc" | "desc";
  timeZone: string;
  empty: ReactNode;
}

const session = columnsFor<SessionRow>();
const token = columnsFor<TokenRow>();
const person = (row: { who: string; role: string }) => <span className="[overflow-wrap:anywhere]">{row.who}<span className="font-normal text-ink-3">, {row.role}</span></span>;
const time = (iso: string | null, timeZone: string, none: string) => <span className="whitespace-nowrap">{iso ? exactText(iso, timeZone) : <span className="text-ink-3">{none}</span>}</span>;

/** Who was signed in from when to when, and how it ended. */
export function SessionList({ list, sort, order, timeZone, empty }: Shown<SessionRow>) {
  const columns = useMemo(() => session.columns([
    session.accessor("who", { id: "who", header: "Who", cell: ({ row }) => person(row.original) }),
    session.accessor("from", { id: "from", header: "Signed in", cell: ({ row }) => time(row.original.from, timeZone, "") }),
    session.accessor("lastStep", { id: "last", header: "Last step", cell: ({ row }) => time(row.original.lastStep, timeZone, "") }),
    session.accessor("ended", { id: "ended", header: "Ended", cell: ({ row }) => time(row.original.ended, timeZone, "") }),
    session.display({ id: "how", header: "How", enableSorting: false, cell: ({ row }) => <FindingLine kind={row.original.how === "open" ? "run" : "done"}>{END_WORD[row.original.how]}</FindingLine> }),
  ]), [timeZone]);
  return <DataTable caption="Sessions" columns={columns} list={list} sort={sort} order={order} rowId={(row) => `${row.who} ${row.from}`} empty={empty} phone={{ how: "bare l-full" }} />;
}

/** Bench tokens by name: made, used, withdrawn. */
export function TokenList({ list, sort, order, timeZone, empty }: Shown<TokenRow>) {
  const columns = useMemo(() => token.columns([
    token.accessor("name", { id: "name", header: "Token", cell: ({ row }) => <span className="[overflow-wrap:anywhere]">{row.original.name}</span> }),
    token.accessor("who", { id: "who", header: "Of", cell: ({ row }) => person(row.original) }),
    token.accessor("made", { id: "made", header: "Made", cell: ({ row }) => time(row.original.made, timeZone, "") }),
    token.accessor("lastUsed", { id: "used", header: "Last used", cell: ({ row }) => time(row.original.lastUsed, timeZone, "never") }),
    token.accessor("withdrawn", { id: "withdrawn", header: "Withdrawn", cell: ({ row }) => time(row.original.withdrawn, timeZone, "no") }),
  ]), [timeZone]);
  return <DataTable caption="Bench tokens" columns={columns} list={list} sort={sort} order={order} rowId={(row) => `${row.name} ${row.made}`} empty={empty} phone={{ who: "bare l-top" }} />;
}
