"use client";

import Link from "next/link";
import { useMemo, type ReactNode } from "react";
import { columnsFor, DataTable } from "@/components/ui/data-table";
import { Digest } from "@/components/ui/digest";
import { FindingLine } from "@/components/ui/finding-line";
import { exactText } from "@/components/ui/times";
import type { StoredImageRow } from "@/lib/core/audit-rows";
import { sizeText } from "@/lib/core/quantity";

const column = columnsFor<StoredImageRow>();
const STATE = { sound: { mark: "ok", word: "Equals its digest" }, damaged: { mark: "block", word: "Damaged" }, missing: { mark: "block", word: "Missing" }, erased: { mark: "aside", word: "Erased" } } as const;

interface UsedBy {
  place: string;
  /** the page of the chip, else of the drive, else of the case; null for a board on the shelf */
  href: string | null;
  /** "Read 2", "photo" */
  as: string[];
}

/** "Case 26-0042, Drive A, Orig U12" with all that is kept of it in one line. */
function byPlace(uses: StoredImageRow["uses"]): UsedBy[] {
  const places = new Map<string, UsedBy>();
  for (const { chipId, driveId, caseId, name } of uses) {
    const words = name.split(", ");
    // what follows the thing's name: a read's number and what its text was, or the word for a photo
    const split = chipId ? 3 : words.length - 1;
    const place = words.slice(0, split).join(", ");
    const known = places.get(place) ?? { place, href: chipId ? `/chips/${chipId}` : driveId ? `/drives/${driveId}` : caseId ? `/cases/${caseId}` : null, as: [] };
    known.as.push(words.slice(split).join(", "));
    places.set(place, known);
  }
  return [...places.values()];
}

/** Stored images by when their bytes were last read whole, the longest ago first. */
export function ImageList({ list, sort, order, timeZone, empty }: {
  list: { items: StoredImageRow[]; total: number; page: number; pageSize: number };
  sort: string;
  order: "asc" | "desc";
  timeZone: string;
  empty: ReactNode;
}) {
  const columns = useMemo(() => column.columns([
    column.accessor("sha256", { id: "sha256", header: "SHA-256", enableSorting: false, cell: ({ row }) => <span className="font-normal"><Digest sha256={row.original.sha256} /></span> }),
    column.accessor("state", { id: "state", header: "State", cell: ({ row }) => <FindingLine kind={STATE[row.original.state].mark}>{STATE[row.original.state].word}{row.original.erasedAt ? ` on ${exactText(row.original.erasedAt, timeZone)}` : ""}</FindingLine> }),
    column.accessor("sizeBytes", { id: "size", header: "Size", cell: ({ row }) => sizeText(row.original.sizeBytes) }),
    column.accessor("checkedAt", { id: "checked", header: "Last read whole", cell: ({ row }) => <span className="whitespace-nowrap">{row.original.checkedAt ? exactText(row.original.checkedAt, timeZone) : <span className="text-ink-2">not since it was stored</span>}</span> }),
    column.accessor("storedAt", { id: "stored", header: "Stored", cell: ({ row }) => <span className="whitespace-nowrap">{exactText(row.original.storedAt, timeZone)}</span> }),
    column.display({
      id: "uses", header: "Used by", enableSorting: false, cell: ({ row: { original: { uses, useCount } } }) => (
        <>{byPlace(uses).map(({ place, href, as }) => <span key={place} className="block">{href ? <Link href={href}>{place}</Link> : place}: {as.join("; ")}</span>)}
          {useCount > uses.length ? <span className="block text-ink-2">and {useCount - uses.length} more</span> : useCount === 0 ? <span className="text-ink-2">nothing on record</span> : null}</>
      ),
    }),
  ]), [timeZone]);
  return (
    <DataTable caption="Stored images" columns={columns} list={list} sort={sort} order={order} rowId={(row) => row.sha256} empty={empty} numeric={["size"]}
      phone={{ state: "bare l-top", uses: "bare l-full", checked: "l-row", stored: "l-row" }} rowClass={(row) => (row.state === "sound" ? "" : row.state === "erased" ? "is-aside" : "is-odd")} />
  );
}
