"use client";

import { useCallback, useMemo, useRef, useState, type KeyboardEvent } from "react";
import { nextDifference, StripGrid } from "@/components/strip/strip-grid";
import { listText } from "@/lib/core/quantity";
import { addressDigits } from "@/lib/core/strip";
import { readName } from "@/lib/core/words";
import type { ComparedReads, ReadView, StripView } from "@/lib/views";
import { CompareBar } from "./compare-bar";
import { CopyHex } from "./copy-hex";
import { FindBar } from "./find-bar";
import { LINE } from "./hex-layout";
import type { Hit } from "./hex-table";
import { HexView } from "./hex-view";
import type { Goal } from "./use-hex-scroll";
import { useLetterKeys, useLetterKeysOn } from "@/components/ui/letter-keys";
import { rangeAt, standsAlone, stepRange } from "./places";
import { RangeList } from "./range-list";

const cellOf = (view: StripView, at: number) => {
  const cell = Math.floor((at - view.offset) / view.cellBytes);
  return cell >= 0 && cell < (view.rows[0]?.cells.length ?? 0) ? cell : null;
};

/** Strips, ranges and bytes of two or three reads, all about one address that also stands in the page's own address. */
export function CompareScreen({ compared, reads, start, csv }: {
  compared: ComparedReads;
  reads: readonly ReadView[];
  start: number | null;
  /** where the ranges are had as CSV; null where they aren't */
  csv: string | null;
}) {
  const { stack, ranges } = compared;
  const { sizeBytes } = stack;
  const [goal, setGoal] = useState<Goal>(() => ({ at: Math.min(start ?? ranges[0]?.start ?? 0, Math.max(0, sizeBytes - 1)) }));
  const { at } = goal;
  const [hit, setHit] = useState<Hit | null>(null);
  const [fold, setFold] = useState(true);
  const [under, setUnder] = useState(false);
  const [keys, setKeys] = useLetterKeysOn();
  const field = useRef<HTMLInputElement>(null);
  const current = rangeAt(ranges, at);
  const inside = ranges[current] && at < ranges[current].start + ranges[current].length ? ranges[current] : null;
  const names = useMemo(() => compared.reads.map((r) => readName(r.stage, r.number)), [compared.reads]);
  const alone = useMemo(() => standsAlone(reads, compared.reads), [reads, compared.reads]);

  const go = useCallback((next: number, still?: true) => {
    setGoal({ at: next, still });
    const url = new URL(window.location.href);
    url.searchParams.set("at", `0x${next.toString(16).toUpperCase().padStart(addressDigits(sizeBytes), "0")}`);
    window.history.replaceState(null, "", url);
  }, [sizeBytes]);
  const step = useCallback((way: 1 | -1) => {
    const range = stepRange(ranges, at, way);
    if (range) go(range.start);
  }, [ranges, at, go]);
  useLetterKeys(keys, useCallback((letter: string) => {
    if (letter === "n") step(1);
    else if (letter === "p") step(-1);
    else if (letter === "g") field.current?.select();
    else return false;
    return true;
  }, [step]));

  /** in the strips N and P go by range as well, not by cell */
  function onStripKey(event: KeyboardEvent) {
    const letter = event.key.toLowerCase();
    if ((letter !== "n" && letter !== "p") || event.ctrlKey || event.metaKey || event.altKey) return;
    event.preventDefault();
    event.stopPropagation();
    if (keys) step(letter === "n" ? 1 : -1);
  }
  const onCell = (view: StripView) => (cell: number) => {
    const from = view.offset + Math.floor(cell * view.cellBytes);
    const first = ranges[rangeAt(ranges, from) + 1];
    const before = ranges[rangeAt(ranges, from)];
    const reaches = before && before.start + before.length > from;
    go(!reaches && first && first.start < from + view.cellBytes ? first.start : from);
  };
  const showBytes = (address: number) => {
    go(address);
    document.getElementById("bytes")?.scrollIntoView({ block: "start" });
  };
  const grid = (view: StripView, label: string) => (
    <StripGrid view={view} sizeBytes={sizeBytes} label={label} cursor={cellOf(view, at)} onCursor={onCell(view)} onOpen={showBytes} />
  );

  return (
    <>
      <div className="compare-strips strips" onKeyDownCapture={onStripKey}>
        {grid(stack, `Strips of ${listText(names)}. Arrow keys move by one cell, N and P by difference, Enter shows the bytes.`)}
        {stack.loupe && nextDifference(stack.loupe, 0, 1) !== null ? <div className="pt-5"><p className="pb-1 text-t2 text-ink-2">Around the differences, larger</p>{grid(stack.loupe, "The part around the differences, larger. The same keys.")}</div> : null}
      </div>
      <CompareBar current={current} total={ranges.length} at={at} sizeBytes={sizeBytes} fold={fold} under={under} keys={keys} field={field}
        onStep={step} onGo={go} onFold={setFold} onUnder={setUnder} onKeys={setKeys}>
        <div className="flex flex-wrap gap-x-8 gap-y-2.5 pt-2.5">
          <FindBar reads={compared.reads} names={names} at={at} hit={hit} sizeBytes={sizeBytes} onFound={(found) => { setHit(found); go(found.at); }} />
          <CopyHex reads={compared.reads} names={names} stretch={inside ?? { start: at - (at % LINE), length: Math.min(LINE, sizeBytes - at + (at % LINE)) }} sizeBytes={sizeBytes} />
        </div>
      </CompareBar>
      <div id="bytes" className={`compare-bytes ${names.length > 2 ? "is-three" : ""}`}>
        <RangeList ranges={ranges} truncated={compared.truncated ?? false} current={current} sizeBytes={sizeBytes} csv={csv} onGo={go} />
        <HexView reads={compared.reads} names={names} alone={alone} ranges={ranges} truncated={compared.truncated ?? false} stack={stack} goal={goal} hit={hit} fold={fold} under={under} onPoint={(address) => go(address, true)} />
      </div>
    </>
  );
}
