"use client";

import { address, rangeText } from "@/lib/core/strip";
import { countOf } from "@/lib/core/quantity";
import { type ByteLine, type Fold, LINE, runsOf } from "./hex-rows";

interface Column {
  name: string;
  note: string;
}

function Bytes({ line, side, alone, name }: { line: ByteLine; side: 0 | 1; alone: 0 | 1; name: string }) {
  return (
    <td className="hex-bytes">
      <span className="hex-name">{name}</span>
      {runsOf(line.bytes[side], line.differs).map((run, i) => run.differs ? <b key={i} className={side === alone ? "hex-odd" : "hex-other"}>{run.text}</b> : <span key={i}>{run.text}</span>)}
    </td>
  );
}

/** Two reads, 16 bytes a line; equal stretches fold to one row with their byte count. */
export function HexTable({ rows, columns, alone, here, under, sizeBytes, onOpen }: {
  rows: readonly (ByteLine | Fold)[];
  columns: readonly [Column, Column];
  /** which side is filled: the one that stands alone */
  alone: 0 | 1;
  here: number;
  /** reads under each other instead of side by side */
  under: boolean;
  sizeBytes: number;
  onOpen(foldStart: number): void;
}) {
  return (
    <table className={`hex ${under ? "is-under" : ""}`}>
      <caption className="sr-only">Bytes of {columns[0].name} and {columns[1].name}, {LINE} in a line</caption>
      <thead>
        <tr>
          <th scope="col" className="!pl-[9px]">Address</th>
          {columns.map((column) => <th key={column.name} scope="col" className="!pl-3">{column.name} <small>{column.note}</small></th>)}
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => row.kind === "fold" ? (
          <tr key={row.start}>
            <td colSpan={3} className="hex-fold"><button type="button" onClick={() => onOpen(row.start)}>{countOf(row.length, "byte")} equal, <code>{rangeText(row.start, row.length, sizeBytes)}</code><span className="sr-only">. Show them.</span></button></td>
          </tr>
        ) : (
          <tr key={row.at} id={`at-${row.at.toString(16)}`} className={`${row.differing > 0 ? "differs" : ""} ${here >= row.at && here < row.at + LINE ? "is-here" : ""}`}>
            <th scope="row" className="hex-at">{address(row.at, sizeBytes)}{row.differing > 0 ? <span className="sr-only">, {countOf(row.differing, "byte")} {row.differing === 1 ? "differs" : "differ"}</span> : null}</th>
            <Bytes line={row} side={0} alone={alone} name={columns[0].name} />
            <Bytes line={row} side={1} alone={alone} name={columns[1].name} />
          </tr>
        ))}
      </tbody>
    </table>
  );
}

export function HexKey({ alone, columns }: { alone: 0 | 1; columns: readonly [Column, Column] }) {
  return (
    <p className="flex flex-wrap gap-x-[22px] gap-y-1.5 pt-3.5 text-t2 text-ink-2">
      <span><b className="hex-odd mr-[7px] px-1 font-mono">FF</b>{columns[alone].name}, where it differs</span>
      <span><b className="hex-other mr-[7px] px-1 font-mono">3C</b>what {columns[alone === 0 ? 1 : 0].name} holds there</span>
      <span><span className="mr-[7px] px-1 font-mono">3C</span>equal in both</span>
      <span><span className="mr-[7px] px-1 font-mono">--</span>past the end of the image</span>
    </p>
  );
}
