"use client";

import { useMemo, type ReactNode } from "react";
import { columnsFor, DataTable } from "@/components/ui/data-table";
import { Digest } from "@/components/ui/digest";
import { FindingLine } from "@/components/ui/finding-line";
import { exactText } from "@/components/ui/times";
import { withCommas } from "@/lib/core/quantity";
import type { AuditSealRow } from "@/lib/core/audit-rows";
import { CAUSE } from "./seal-words";

const column = columnsFor<AuditSealRow>();

function mailWords({ sent, waiting, givenUp }: AuditSealRow["mailed"]): string {
  const all = sent + waiting + givenUp;
  if (all === 0) return "not mailed";
  const words = [sent > 0 ? `${sent} sent` : "", waiting > 0 ? `${waiting} waiting` : "", givenUp > 0 ? `${givenUp} given up` : ""].filter(Boolean);
  return words.join(", ");
}

/** The chain of seals, the newest first; each is held against its text, its key and the seal before it. */
export function SealList({ list, order, timeZone, empty }: { list: { items: AuditSealRow[]; total: number; page: number; pageSize: number }; order: "asc" | "desc"; timeZone: string; empty: ReactNode }) {
  const columns = useMemo(() => column.columns([
    column.accessor("number", { id: "number", header: "Seal", cell: ({ row }) => withCommas(row.original.number) }),
    column.display({ id: "at", header: "Time", enableSorting: false, cell: ({ row }) => <span className="whitespace-nowrap">{exactText(row.original.at, timeZone)}</span> }),
    column.display({ id: "cause", header: "Why", enableSorting: false, cell: ({ row }) => <span className="whitespace-nowrap">{CAUSE[row.original.cause]}</span> }),
    column.display({ id: "chains", header: "Logs", enableSorting: false, cell: ({ row }) => withCommas(row.original.chains) }),
    column.display({ id: "sha256", header: "SHA-256", enableSorting: false, cell: ({ row }) => <Digest sha256={row.original.sha256} /> }),
    column.display({ id: "root", header: "Root", enableSorting: false, cell: ({ row }) => (row.original.root ? <Digest sha256={row.original.root} /> : null) }),
    column.display({
      id: "link", header: "Checked", enableSorting: false, cell: ({ row: { original: row } }) => (row.faults.length === 0
        ? <FindingLine kind="ok">{row.number === 1 ? "signed, the first" : `signed, links to ${withCommas(row.number - 1)}`}</FindingLine>
        : row.faults.map((fault) => <FindingLine key={fault} kind="block">{fault}</FindingLine>)),
    }),
    column.display({ id: "mailed", header: "Mail", enableSorting: false, cell: ({ row }) => <span className={row.original.mailed.givenUp > 0 ? "text-block" : "text-ink-2"}>{mailWords(row.original.mailed)}</span> }),
    column.display({
      id: "files", header: "Files", enableSorting: false, cell: ({ row: { original: row } }) => (
        <span className="flex flex-wrap gap-x-3">
          {([["text", "seal.txt"], ["signature", "seal.sig"], ["key", "seal-key.pem"]] as const).map(([file, name]) => (
            <a key={file} className="whitespace-nowrap" href={`/api/seals/${row.number}?file=${file}`} download>{name}<span className="sr-only"> of seal {row.number}</span></a>
          ))}
        </span>
      ),
    }),
  ]), [timeZone]);
  return (
    <DataTable caption="Seals" columns={columns} list={list} sort="number" order={order} rowId={(row) => String(row.number)} empty={empty} numeric={["chains"]}
      phone={{ link: "bare l-full", at: "bare l-top", cause: "bare", sha256: "l-row", root: "l-row", files: "bare l-row" }} rowClass={(row) => (row.faults.length > 0 ? "is-odd" : "")} />
  );
}
