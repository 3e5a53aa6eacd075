"use client";

import { memo, useLayoutEffect, useRef, type RefObject } from "react";
import { address, rangeText } from "@/lib/core/strip";
import { countOf, listText, withCommas } from "@/lib/core/quantity";
import { WINDOW_BYTES } from "./byte-cache";
import { type HexRow, LINE } from "./hex-layout";
import { bytesOfLine, markLine, runsOf, WAITING_LINE } from "./hex-rows";

export interface Column {
  name: string;
  note: string;
}

/** What was searched for and where it lies: in which of the reads, from which address. */
export interface Hit {
  side: number;
  at: number;
  length: number;
}

interface LineProps {
  at: number;
  row: number;
  length: number;
  columns: readonly Column[];
  /** the window of each read that holds this line; null until it is here */
  a: Uint8Array | null;
  b: Uint8Array | null;
  c?: Uint8Array | null;
  alone: number;
  here: boolean;
  hit: Hit | null;
  sizeBytes: number;
}

const bytesClass = { odd: "hex-odd", other: "hex-other", equal: "" };

// a line changes only when its bytes do: it stays as it is while others are scrolled in
const Line = memo(function Line({ at, row, length, columns, a, b, c, alone, here, hit, sizeBytes }: LineProps) {
  const windows = c === undefined ? [a, b] : [a, b, c];
  const from = Math.floor(at / WINDOW_BYTES) * WINDOW_BYTES;
  const line = windows.every((one) => one !== null) ? markLine(windows.map((one) => bytesOfLine(one!, from, at, length)), alone) : null;
  const found = (side: number): [number, number] => (hit?.side === side ? [hit.at - at, hit.at + hit.length - at] : [0, 0]);
  const differing = line?.differing ?? 0;
  return (
    <tr aria-rowindex={row + 2} data-at={at} className={`hex-line ${differing > 0 ? "differs" : ""} ${here ? "is-here" : ""}`}>
      <th scope="row" className="hex-at">{address(at, sizeBytes)}{differing > 0 ? <span className="sr-only">, {countOf(differing, "byte")} {differing === 1 ? "differs" : "differ"}</span> : null}</th>
      {columns.map((column, side) => (
        <td key={column.name} className="hex-bytes">
          <span className="hex-name">{column.name}</span>
          {line ? runsOf(line.bytes[side], line.marks[side], found(side)).map((run, i) => run.mark === "equal" && !run.found ? run.text
            : <b key={i} className={`${bytesClass[run.mark]} ${run.found ? "hex-found" : ""}`}>{run.text}</b>) : <span className="hex-none">{WAITING_LINE}</span>}
        </td>
      ))}
    </tr>
  );
});

/** Whoever stood on a button that was folded open or scrolled away stands in the box then. */
function useKeptFocus(boxRef: RefObject<HTMLElement | null>): (element: Element) => void {
  const last = useRef<Element | null>(null);
  useLayoutEffect(() => {
    if (!last.current || last.current.isConnected) return;
    if (document.activeElement === document.body) boxRef.current?.focus({ preventScroll: true });
    last.current = null;
  });
  return (element) => {
    last.current = element;
  };
}

/** The rows that are seen, of two or three reads, 16 bytes a line; equal stretches fold to one row with their byte count. */
export function HexTable({ rows, total, columns, windowOf, alone, here, hit, sizeBytes, boxRef, onOpen, onPoint }: {
  rows: readonly HexRow[];
  /** rows of the whole image */
  total: number;
  columns: readonly Column[];
  windowOf(side: number, number: number): Uint8Array | null;
  alone: number;
  here: number;
  hit: Hit | null;
  sizeBytes: number;
  boxRef: RefObject<HTMLElement | null>;
  onOpen(row: HexRow): void;
  onPoint(at: number): void;
}) {
  const keepFocus = useKeptFocus(boxRef);
  const equal = columns.length === 2 ? "equal" : "equal in all three";
  const touches = (row: HexRow) => hit && hit.at < row.at + LINE && hit.at + hit.length > row.at ? hit : null;
  return (
    <table className="hex" aria-rowcount={total + 1} onFocus={(event) => keepFocus(event.target)}
      onClick={(event) => {
        const line = (event.target as Element).closest("tr")?.dataset.at;
        // who marks text with the pointer doesn't go anywhere
        if (line && !window.getSelection()?.toString()) onPoint(Number(line));
      }}>
      <caption className="sr-only">Bytes of {listText(columns.map((column) => column.name))}, {LINE} in a line</caption>
      <thead>
        <tr aria-rowindex={1}>
          <th scope="col" className="!pl-[9px]">Address</th>
          {columns.map((column) => <th key={column.name} scope="col" className="hex-head">{column.name} <small>{column.note}</small></th>)}
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => row.kind === "fold" ? (
          <tr key={row.at} aria-rowindex={row.row + 2} className="hex-folded">
            <td colSpan={columns.length + 1} className="hex-fold"><button type="button" onClick={() => onOpen(row)}>{withCommas(row.length)} bytes {equal}, <code>{rangeText(row.at, row.length, sizeBytes)}</code><span className="sr-only">. Show them.</span></button></td>
          </tr>
        ) : (
          <Line key={row.at} at={row.at} row={row.row} length={row.length} columns={columns} alone={alone} here={here >= row.at && here < row.at + LINE} hit={touches(row)} sizeBytes={sizeBytes}
            a={windowOf(0, Math.floor(row.at / WINDOW_BYTES))} b={windowOf(1, Math.floor(row.at / WINDOW_BYTES))} c={columns.length > 2 ? windowOf(2, Math.floor(row.at / WINDOW_BYTES)) : undefined} />
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
