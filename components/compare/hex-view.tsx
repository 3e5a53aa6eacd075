"use client";

import { useMemo, useState } from "react";
import { Button } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import { Note } from "@/components/ui/note";
import { rangeText } from "@/lib/core/strip";
import { seatingLetter } from "@/lib/core/words";
import type { ReadView } from "@/lib/views";
import { foldLines, hexLines } from "./hex-rows";
import { HexKey, HexTable } from "./hex-table";
import { STEP_BYTES, useBytes, windowOf } from "./use-bytes";
import { useGrowing } from "./use-growing";

/** The bytes around one address of each read, fetched as they are looked at. */
export function HexView({ reads, names, alone, at, sizeBytes, fold, under, onGo }: {
  reads: readonly ReadView[];
  names: readonly string[];
  alone: number;
  at: number;
  sizeBytes: number;
  fold: boolean;
  under: boolean;
  onGo(at: number): void;
}) {
  const { offset, length } = windowOf(at, sizeBytes);
  const [a, b, c] = [useBytes(reads[0], offset, length), useBytes(reads[1], offset, length), useBytes(reads[2] ?? null, offset, length)];
  const three = reads.length > 2;
  const [opened, setOpened] = useState<ReadonlySet<number>>(new Set());
  const lines = useMemo(() => {
    if (!a.bytes || !b.bytes || (three && !c.bytes)) return null;
    return hexLines({ images: three && c.bytes ? [a.bytes, b.bytes, c.bytes] : [a.bytes, b.bytes], offset, length, alone });
  }, [a.bytes, b.bytes, c.bytes, three, alone, offset, length]);
  const all = useMemo(() => lines && foldLines(lines, { fold, here: at, opened }), [lines, fold, at, opened]);
  // what stands elsewhere, folds otherwise or is laid out anew is put on the page from its top again
  const count = useGrowing(`${offset} ${fold} ${under}`, all?.length ?? 0);
  const rows = all && all.slice(0, count);
  const columns = useMemo(() => reads.map((r, i) => ({ name: names[i], note: r.derived ? "composite" : `seating ${seatingLetter(r.seating)}, ${r.reader}` })), [reads, names]);
  const error = a.error ?? b.error ?? c.error;
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
          <div className="overflow-x-auto"><HexTable key={String(under)} rows={rows} columns={columns} here={at} under={under} sizeBytes={sizeBytes} onOpen={(start) => setOpened((before) => new Set([...before, start]))} /></div>
          <HexKey alone={alone} columns={columns} />
        </>
      ) : <p role="status" className="py-6 text-ink-2">Fetching the bytes of {rangeText(offset, length, sizeBytes)}.</p>}
    </div>
  );
}
