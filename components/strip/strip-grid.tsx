"use client";

import { Fragment, useRef, type CSSProperties, type KeyboardEvent, type MouseEvent } from "react";
import { address } from "@/lib/core/strip";
import { sizeText, withCommas } from "@/lib/core/quantity";
import type { StripView } from "@/lib/views";
import { cellCount, cellStart, cellWords, differing, foldAgrees, SEGMENT } from "./cell-words";
import { LaneSvg, StripSvg } from "./strip-svg";

const STEP: Record<string, number> = { ArrowLeft: -1, ArrowRight: 1, ArrowDown: -1, ArrowUp: 1, PageUp: -16, PageDown: 16 };
const TICK = 16;
/** a count with more digits leaves no room for its word beside the lane, whose ticks say the same */
const LONGEST = 99_999;

const at = (segment: number, row: number) => ({ "--s": segment, "--r": row }) as CSSProperties;

/** On a phone "Read 2" is "2" and "Back 1" is "B1": the column has room for two letters. */
function shortName(name: string): string {
  return name.replace(/^Read /, "").replace(/^([A-Z])[a-z]+ /, "$1");
}

export interface StripGridProps {
  view: StripView;
  sizeBytes: number;
  label: string;
  /** the cell under the frame, or null while nobody looked */
  cursor: number | null;
  onCursor(cell: number): void;
  onOpen(address: number): void;
}

/** The next cell with a difference in one direction, round the end; null when all is equal. */
export function nextDifference(view: StripView, from: number, step: 1 | -1): number | null {
  const counts = differing(view);
  for (let k = 1; k <= counts.length; k += 1) {
    const i = (from + step * k + counts.length * k) % counts.length;
    if (counts[i] > 0) return i;
  }
  return null;
}

/** Reads under each other under one ruler, a lane between each two, one frame over all. Folds in four lines on phones. */
export function StripGrid({ view, sizeBytes, label, cursor, onCursor, onOpen }: StripGridProps) {
  const slider = useRef<HTMLDivElement>(null);
  const count = cellCount(view);
  const segments = Array.from({ length: Math.ceil(count / SEGMENT) }, (_, s) => s);
  const rows = view.rows.length * 2;
  const now = cursor ?? 0;
  const words = cellWords(view, now, sizeBytes);

  function onKey(event: KeyboardEvent) {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const key = event.key;
    if (key in STEP) onCursor(Math.min(count - 1, Math.max(0, now + STEP[key])));
    else if (key === "Home") onCursor(0);
    else if (key === "End") onCursor(count - 1);
    else if (key === "n" || key === "N") onCursor(nextDifference(view, now, 1) ?? now);
    else if (key === "p" || key === "P") onCursor(nextDifference(view, now, -1) ?? now);
    else if (key === "Enter") onOpen(cellStart(view, now));
    else return;
    event.preventDefault();
  }

  function onClick(event: MouseEvent, segment: number) {
    const box = event.currentTarget.getBoundingClientRect();
    onCursor(Math.min(count - 1, segment * SEGMENT + Math.floor(((event.clientX - box.left) / box.width) * SEGMENT)));
    slider.current?.focus({ preventScroll: true });
  }

  return (
    <div className="stack" style={{ "--n": rows, "--folds": segments.length } as CSSProperties}>
      <div ref={slider} className="stack-key" role="slider" tabIndex={0} aria-label={label} aria-valuemin={0} aria-valuemax={count - 1} aria-valuenow={now}
        aria-valuetext={[words.span, words.says, words.differs].filter(Boolean).join(", ")} onKeyDown={onKey} onFocus={() => { if (cursor === null) onCursor(0); }} />
      <div className="stack-name stack-name-ruler" style={at(0, 1)}><span>{view.cellBytes >= 1 ? `${sizeText(Math.ceil(view.cellBytes)).replace(/ bytes?$/, " B")} a cell` : ""}</span></div>
      {segments.map((s) => (
        <div key={s} className="stack-ruler" style={at(s, 1)} aria-hidden="true">
          {Array.from({ length: SEGMENT / TICK }, (_, k) => (
            <i key={k} className={k % 2 ? "odd" : ""} style={{ left: `calc(var(--cell) * ${k * TICK})` }}>{address(cellStart(view, s * SEGMENT + k * TICK), sizeBytes)}</i>
          ))}
        </div>
      ))}
      {view.rows.map((row, r) => {
        const lane = r > 0 ? view.lanes[r - 1] : null;
        const differs = lane !== null && lane.cells !== null && lane.differingBytes > 0;
        return (
          <Fragment key={row.readId}>
            {lane ? <div className={`stack-end ${differs ? "stack-end-differ" : "stack-end-equal"}`} style={at(0, r * 2 + 1)}>{differs ? <span>{withCommas(lane.differingBytes)}{"\u00a0"}B<span className={lane.differingBytes > LONGEST ? "sr-only" : ""}> {lane.differingBytes === 1 ? "differs" : "differ"}</span></span> : "equal"}</div> : null}
            {segments.map((s) => {
              const all = foldAgrees(view, s);
              const rest = all && r > 0 ? "is-rest" : "";
              const short = all ? "all" : shortName(row.name);
              return (
                <Fragment key={s}>
                  {lane ? <div className={`stack-lane ${rest}`} style={at(s, r * 2 + 1)} onClick={(event) => onClick(event, s)}><LaneSvg counts={lane.cells?.slice(s * SEGMENT, (s + 1) * SEGMENT) ?? null} length={SEGMENT} /></div> : null}
                  <div className={`stack-strip ${rest}`} style={at(s, r * 2 + 2)} onClick={(event) => onClick(event, s)}><StripSvg cells={row.cells.slice(s * SEGMENT, (s + 1) * SEGMENT)} /></div>
                  <div className={`stack-name ${s > 0 ? "is-later" : ""} ${rest}`} style={at(s, r * 2 + 2)} aria-hidden={s > 0 || undefined}>
                    <b><span className="when-wide">{row.name}</span><span className="when-phone">{short}</span></b>
                    <small>{row.note}</small>
                  </div>
                </Fragment>
              );
            })}
          </Fragment>
        );
      })}
      {segments.map((s) => cursor !== null && Math.floor(cursor / SEGMENT) === s
        ? <div key={s} className="stack-frame" style={at(s, 1)}><i style={{ left: `calc(var(--cell) * ${cursor % SEGMENT})` }} /></div> : null)}
    </div>
  );
}
