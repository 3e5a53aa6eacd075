"use client";

import { createColumnHelper, rowPaginationFeature, rowSortingFeature, tableFeatures, useTable, type ColumnDef, type RowData } from "@tanstack/react-table";
import { usePathname, useRouter, useSearchParams } from "next/navigation";
import type { ReactNode } from "react";
import { Icon } from "./icon";
import { PastTheEnd, Pages } from "./pages";

/** The database sorts and pages; the table only says what it wants through the address (`sort`, `order`, `page`). */
export const serverFeatures = tableFeatures({ rowSortingFeature, rowPaginationFeature });
export type ServerColumn<Row extends RowData> = ColumnDef<typeof serverFeatures, Row>;

/** `columnsFor<Row>().accessor("ref", { header: "Case" })`; a column's id is the `sort` value of the API. */
export function columnsFor<Row extends RowData>() {
  return createColumnHelper<typeof serverFeatures, Row>();
}

export interface DataTableProps<Row extends RowData> {
  caption: string;
  columns: readonly ServerColumn<Row>[];
  list: { items: Row[]; total: number; page: number; pageSize: number };
  sort: string;
  order: "asc" | "desc";
  rowId: (row: Row) => string;
  /** what stands here when nothing is found */
  empty: ReactNode;
  /** ids of columns with numbers at the right */
  numeric?: readonly string[];
  rowClass?: (row: Row) => string;
  /** how a column's cell stands in the lines of a phone: `l-top` beside the first, `l-full` a line of its own, first of all; `bare` without its head */
  phone?: Readonly<Record<string, string>>;
}

export function DataTable<Row extends RowData>({ caption, columns, list, sort, order, rowId, empty, numeric = [], rowClass, phone = {} }: DataTableProps<Row>) {
  const router = useRouter();
  const path = usePathname();
  const params = useSearchParams();
  const address = (changes: Record<string, string>) => {
    const next = new URLSearchParams(params.toString());
    for (const [key, value] of Object.entries(changes)) next.set(key, value);
    return `${path}?${next.toString()}`;
  };
  const sorting = [{ id: sort, desc: order === "desc" }];
  const table = useTable({
    features: serverFeatures, columns: columns as ServerColumn<Row>[], data: list.items, getRowId: rowId,
    manualSorting: true, manualPagination: true, rowCount: list.total, enableSortingRemoval: false,
    state: { sorting, pagination: { pageIndex: list.page - 1, pageSize: list.pageSize } },
    onSortingChange: (change) => {
      const [first] = typeof change === "function" ? change(sorting) : change;
      if (first) router.push(address({ sort: first.id, order: first.desc ? "desc" : "asc", page: "1" }));
    },
  });
  const pages = { total: list.total, page: list.page, pageSize: list.pageSize, href: (page: number) => address({ page: String(page) }) };
  if (list.items.length === 0) return list.total > 0 ? <PastTheEnd {...pages} /> : <>{empty}</>;
  return (
    <>
      <div className="overflow-x-auto phone:overflow-visible print:overflow-visible">
        <table className="ruled lines">
          <caption className="sr-only">{caption}</caption>
          <thead>
            {table.getHeaderGroups().map((group) => (
              <tr key={group.id}>
                {group.headers.map((header) => {
                  const sorted = header.column.getIsSorted();
                  return (
                    <th key={header.id} scope="col" className={numeric.includes(header.column.id) ? "num" : ""} aria-sort={sorted ? (sorted === "asc" ? "ascending" : "descending") : undefined}>
                      {header.column.getCanSort() ? (
                        <button type="button" onClick={header.column.getToggleSortingHandler()} className={`inline-flex min-h-6 items-center gap-1 hover:underline ${sorted ? "font-bold text-ink" : ""}`}>
                          <table.FlexRender header={header} />
                          {sorted ? <Icon name="up" size={12} className={`!align-baseline ${sorted === "desc" ? "rotate-180" : ""}`} /> : null}
                        </button>
                      ) : <span className="inline-flex min-h-6 items-center"><table.FlexRender header={header} /></span>}
                    </th>
                  );
                })}
              </tr>
            ))}
          </thead>
          <tbody>
            {table.getRowModel().rows.map((row) => (
              <tr key={row.id} className={rowClass?.(row.original)}>
                {row.getAllCells().map((cell, i) => {
                  const number = numeric.includes(cell.column.id) ? "num" : "";
                  const place = phone[cell.column.id] ?? "";
                  const words = typeof cell.column.columnDef.header === "string" ? cell.column.columnDef.header : undefined;
                  return i === 0
                    ? <th key={cell.id} scope="row"><table.FlexRender cell={cell} /></th>
                    : <td key={cell.id} data-l={place.includes("bare") ? undefined : words} className={`${number} ${place}`}><table.FlexRender cell={cell} /></td>;
                })}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <Pages {...pages} />
    </>
  );
}
