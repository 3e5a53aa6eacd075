"use client";

import { memo } from "react";
import { address, rangeText } from "@/lib/core/strip";
import { countOf, listText } from "@/lib/core/quantity";
import { type ByteLine, type ByteMark, type Fold, LINE, runsOf } from "./hex-rows";

export interface Column {
  name: string;
  note: string;
}

const CLASS: Record<Exclude<ByteMark, "equal">, string> = { odd: "hex-odd", other: "hex-other" };

function Bytes({ line, side, name }: { line: ByteLine; side: number; name: string }) {
  return (
    <td className="hex-bytes">
      <span className="hex-name">{name}</span>
      {runsOf(line.bytes[side], line.marks[side]).map((run, i) => run.mark === "equal" ? <span key={i}>{run.text}</span> : <b key={i} className={CLASS[run.mark]}>{run.text}</b>)}
    </td>
  );
}

// a line changes only when its bytes do: hundreds stand on the page while one is stepped to
const Line = memo(function Line({ row, columns, here, sizeBytes }: { row: ByteLine; columns: readonly Column[]; here: boolean; sizeBytes: number }) {
  return (
    <tr id={`at-${row.at.toString(16)}`} className={`${row.differing > 0 ? "differs" : ""} ${here ? "is-here" : ""}`}>
      <th scope="row" className="hex-at">{address(row.at, sizeBytes)}{row.differing > 0 ? <span className="sr-only">, {countOf(row.differing, "byte")} {row.differing === 1 ? "differs" : "differ"}</span> : null}</th>
      {columns.map((column, side) => <Bytes key={column.name} line={row} side={side} name={column.name} />)}
    </tr>
  );
});

/** Two or three reads, 16 bytes a line; equal stretches fold to one row with their byte count. */
export function HexTable({ rows, columns, here, under, sizeBytes, onOpen }: {
  rows: readonly (ByteLine | Fold)[];
  columns: readonly Column[];
  here: number;
  /** reads under each other instead of side by side */
  under: boolean;
  sizeBytes: number;
  onOpen(foldStart: number): void;
}) {
  const equal = columns.length === 2 ? "equal" : "equal in all three";
  return (
    <table className={`hex ${under ? "is-under" : ""} ${columns.length > 2 ? "is-three" : ""}`}>
      <caption className="sr-only">Bytes of {listText(columns.map((column) => column.name))}, {LINE} in a line</caption>
      <thead>
        <tr>
          <th scope="col" className="!pl-[9px]">Address</th>
          {columns.map((column) => <th key={column.name} scope="col" className="hex-head">{column.name} <small>{column.note}</small></th>)}
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => row.kind === "fold" ? (
          <tr key={row.start}>
            <td colSpan={columns.length + 1} className="hex-fold"><button type="button" onClick={() => onOpen(row.start)}>{countOf(row.length, "byte")} {equal}, <code>{rangeText(row.start, row.length, sizeBytes)}</code><span className="sr-only">. Show them.</span></button></td>
          </tr>
        ) : (
          <Line key={row.at} row={row} columns={columns} here={here >= row.at && here < row.at + LINE} sizeBytes={sizeBytes} />
        ))}
      </tbody>
    </table>
  );
}

export function HexKey({ alone, columns }: { alone: number; columns: readonly Column[] }) {
  const two = columns.length === 2;
  return (
    <p className="flex flex-wrap gap-x-[22px] gap-y-1.5 pt-3.5 text-t2 text-ink-2">
      <span><b className="hex-odd mr-[7px] px-1 font-mono">FF</b>{two ? `${columns[alone].name}, where it differs` : "the read that stands alone"}</span>
      <span><b className="hex-other mr-[7px] px-1 font-mono">3C</b>{two ? `what ${columns[alone === 0 ? 1 : 0].name} holds there` : "what the others hold there"}</span>
      <span><span className="mr-[7px] px-1 font-mono">3C</span>{two ? "equal in both" : "equal in all three"}</span>
      <span><span className="mr-[7px] px-1 font-mono">--</span>past the end of the image</span>
    </p>
  );
}
