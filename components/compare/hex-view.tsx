"use client";

import { useMemo, useState } from "react";
import { Button } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import { Note } from "@/components/ui/note";
import { rangeText } from "@/lib/core/strip";
import { seatingLetter } from "@/lib/core/words";
import type { ReadView } from "@/lib/views";
import { hexRows } from "./hex-rows";
import { HexKey, HexTable } from "./hex-table";
import { STEP_BYTES, useBytes, windowOf } from "./use-bytes";

/** The bytes around one address of both reads, fetched as they are looked at. */
export function HexView({ reads, names, alone, at, sizeBytes, fold, under, onGo }: {
  reads: readonly [ReadView, ReadView];
  names: readonly [string, string];
  alone: 0 | 1;
  at: number;
  sizeBytes: number;
  fold: boolean;
  under: boolean;
  onGo(at: number): void;
}) {
  const { offset, length } = windowOf(at, sizeBytes);
  const a = useBytes(reads[0], offset, length);
  const b = useBytes(reads[1], offset, length);
  const [opened, setOpened] = useState<ReadonlySet<number>>(new Set());
  const rows = useMemo(() => (a.bytes && b.bytes ? hexRows({ a: a.bytes, b: b.bytes, offset, length }, { fold, here: at, opened }) : null), [a.bytes, b.bytes, offset, length, fold, at, opened]);
  const columns = reads.map((r, i) => ({ name: names[i], note: `seating ${seatingLetter(r.seating)}, ${r.reader}` }));
  const pair = [columns[0], columns[1]] as const;
  const error = a.error ?? b.error;
  const [earlier, later] = [offset - STEP_BYTES, offset + STEP_BYTES];
  return (
    <div className="min-w-0">
      <div className="no-print flex flex-wrap items-center justify-between gap-3 pb-2 text-t2">
        <span>Shown: <code className="font-semibold">{rangeText(offset, length, sizeBytes)}</code></span>
        <span className="flex gap-2">
          <Button size="small" disabled={earlier < 0} onClick={() => onGo(Math.max(0, earlier))}><Icon name="prev" />Earlier 4 KiB</Button>
          <Button size="small" disabled={later >= sizeBytes} onClick={() => onGo(later)}>Later 4 KiB<Icon name="next" /></Button>
        </span>
      </div>
      {error ? <Note kind="block" role="alert" title="These bytes can’t be shown.">{error.message}</Note> : rows ? (
        <>
          <div className="overflow-x-auto"><HexTable rows={rows} columns={pair} alone={alone} here={at} under={under} sizeBytes={sizeBytes} onOpen={(start) => setOpened((before) => new Set([...before, start]))} /></div>
          <HexKey alone={alone} columns={pair} />
        </>
      ) : <p role="status" className="py-6 text-ink-2">Fetching the bytes of {rangeText(offset, length, sizeBytes)}.</p>}
    </div>
  );
}
