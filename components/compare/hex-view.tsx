"use client";

import { useEffect, useMemo, useRef, useState, useSyncExternalStore } from "react";
import { Button } from "@/components/ui/button";
import { Note } from "@/components/ui/note";
import { listText } from "@/lib/core/quantity";
import type { Range } from "@/lib/core/words";
import { seatingLetter } from "@/lib/core/words";
import type { ReadView, StripStackView } from "@/lib/views";
import { AddressScale } from "./address-scale";
import { createByteCache, WINDOW_BYTES } from "./byte-cache";
import { layOut } from "./hex-layout";
import { type Hit, HexKey, HexTable } from "./hex-table";
import { type Goal, useHeights, useHexScroll } from "./use-hex-scroll";

/** All bytes of two or three reads in one scrolled box: rows are drawn and bytes fetched as they are looked at. */
export function HexView({ reads, names, alone, ranges, truncated, stack, goal, hit, fold, under, onPoint }: {
  reads: readonly ReadView[];
  names: readonly string[];
  alone: number;
  ranges: readonly Range[];
  truncated: boolean;
  stack: StripStackView;
  goal: Goal;
  hit: Hit | null;
  fold: boolean;
  under: boolean;
  /** an address was pointed at: nothing is scrolled */
  onPoint(at: number): void;
}) {
  const { sizeBytes } = stack;
  const boxRef = useRef<HTMLDivElement>(null);
  const [opened, setOpened] = useState<readonly Range[]>([]);
  const layoutName = `${under ? "is-under" : ""} ${reads.length > 2 ? "is-three" : ""}`;
  const heights = useHeights(boxRef, layoutName);
  const layout = useMemo(() => layOut({ sizeBytes, ranges, truncated, fold, here: goal.at, opened, heights }), [sizeBytes, ranges, truncated, fold, goal, opened, heights]);
  const { rows, partPx, abovePx, seen, onScroll, show, keep } = useHexScroll(boxRef, layout, goal);
  const columns = useMemo(() => reads.map((r, i) => ({ name: names[i], note: r.derived ? "composite" : `seating ${seatingLetter(r.seating)}, ${r.reader}` })), [reads, names]);

  const [cache] = useState(createByteCache);
  useSyncExternalStore(cache.subscribe, cache.version, cache.version);
  const lines = rows.filter((row) => row.kind === "line");
  const numbers = [...new Set(lines.map((row) => Math.floor(row.at / WINDOW_BYTES)))];
  const looked = numbers.join();
  useEffect(() => cache.look(reads, looked === "" ? [] : looked.split(",").map(Number)), [cache, reads, looked]);
  useEffect(() => cache.close, [cache]);
  const error = cache.error();

  return (
    <div className="min-w-0">
      {error ? <Note kind="block" role="alert" title="These bytes can’t be shown." className="mb-3">{error.message} <Button size="small" onClick={cache.again}>Try again</Button></Note> : null}
      <div className={`hex-frame ${layoutName}`}>
        <div ref={boxRef} className="hex-scroll" tabIndex={0} role="region" aria-label={`Bytes of ${listText(names)}`} onScroll={onScroll}
          onKeyDown={(event) => {
            // the browser's own Home and End know of the part in the box only
            if (event.target !== event.currentTarget || (event.key !== "Home" && event.key !== "End")) return;
            event.preventDefault();
            show(event.key === "Home" ? 0 : sizeBytes - 1);
          }}>
          <div className="hex-part" style={{ height: `calc(${partPx}px + var(--hex-head))`, paddingTop: abovePx }}>
            <HexTable rows={rows} total={layout.rows} columns={columns} alone={alone} here={goal.at} hit={hit} sizeBytes={sizeBytes} boxRef={boxRef}
              windowOf={(side, number) => cache.windowOf(reads[side], number)}
              onOpen={(row) => {
                keep(goal.at);
                setOpened((before) => [...before, { start: row.at, length: row.length }]);
              }} onPoint={onPoint} />
          </div>
        </div>
        <AddressScale stack={stack} seen={seen} onShow={show} />
      </div>
      <HexKey alone={alone} columns={columns} />
    </div>
  );
}
