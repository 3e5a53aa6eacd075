"use client";

import { useMemo, useState, type PointerEvent } from "react";
import { CELLS, address } from "@/lib/core/strip";
import type { StripStackView } from "@/lib/views";

/** One tick for each of 256 cells in which any two neighbours differ. */
function ticks({ lanes }: StripStackView): string {
  return Array.from({ length: CELLS }, (_, cell) => (lanes.some((lane) => (lane.cells?.[cell] ?? 0) > 0) ? `M2 ${cell}h4v1h-4z` : "")).join("");
}

/**
 * The whole chip from top to bottom: where reads differ, which part is seen, and a way to any other by pointer. Keys have
 * "Go to", the strips and the box itself, so it is drawn only.
 */
export function AddressScale({ stack, seen, onShow }: { stack: StripStackView; seen: { from: number; to: number }; onShow(at: number): void }) {
  const { sizeBytes } = stack;
  // drawn anew with every few lines scrolled: the ticks stay
  const drawn = useMemo(() => ticks(stack), [stack]);
  const [held, setHeld] = useState<number | null>(null);
  const part = (at: number) => `${(Math.min(at, sizeBytes) / sizeBytes) * 100}%`;
  function move(event: PointerEvent<HTMLDivElement>) {
    const { top, height } = event.currentTarget.getBoundingClientRect();
    const at = Math.floor((Math.min(Math.max(0, event.clientY - top), height - 1) / height) * sizeBytes);
    setHeld(at);
    onShow(at);
  }
  return (
    <div className="hex-scale" aria-hidden="true"
      onPointerDown={(event) => {
        event.currentTarget.setPointerCapture(event.pointerId);
        move(event);
      }}
      onPointerMove={(event) => { if (held !== null) move(event); }} onPointerUp={() => setHeld(null)} onPointerCancel={() => setHeld(null)}>
      <svg viewBox={`0 0 8 ${CELLS}`} preserveAspectRatio="none"><path d={drawn} /></svg>
      <i style={{ top: part(seen.from), height: part(seen.to - seen.from) }} />
      {held === null ? null : <b style={{ top: part(held) }}>{address(held, sizeBytes)}</b>}
    </div>
  );
}
