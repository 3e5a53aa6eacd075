"use client";

import { useId, useState } from "react";
import { Button } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import { rangeText } from "@/lib/core/strip";
import type { StripStackView } from "@/lib/views";
import { cellStart, cellWords, stackSummary } from "./cell-words";
import { nextDifference, StripGrid } from "./strip-grid";

const KEYS = "Arrow keys move by one cell, Page keys by 16, N and P go to the next and previous difference, Enter opens the bytes.";

/** Reads under each other, the loupe when all differences lie close together, and a line that says what is under the frame. */
export function StripStack({ stack, onOpen }: {
  stack: StripStackView;
  /** Enter on a cell: show the bytes from this address */
  onOpen(address: number): void;
}) {
  const id = useId();
  const { loupe, sizeBytes } = stack;
  const [where, setWhere] = useState<{ in: "stack" | "loupe"; cell: number | null }>(() => ({ in: "stack", cell: stack.rows.length > 1 ? nextDifference(stack, -1, 1) : null }));
  const looked = where.in === "loupe" && loupe ? loupe : stack;
  const words = where.cell === null ? null : cellWords(looked, where.cell, sizeBytes);
  const any = nextDifference(stack, 0, 1) !== null;
  const jump = (step: 1 | -1) => setWhere((before) => {
    const view = before.in === "loupe" && loupe ? loupe : stack;
    return { ...before, cell: nextDifference(view, before.cell ?? -1, step) };
  });

  return (
    <div className="strips">
      <p id={id} className="sr-only">{stackSummary(stack)}</p>
      <StripGrid view={stack} sizeBytes={sizeBytes} label={`Strips of the reads under one address ruler. ${KEYS}`} cursor={where.in === "stack" ? where.cell : null} onCursor={(cell) => setWhere({ in: "stack", cell })} onOpen={onOpen} />
      {loupe ? (
        <>
          <Leader stack={stack} />
          <p className="loupe-title"><b>Loupe:</b> <span className="font-mono">{rangeText(loupe.offset, loupe.cellBytes * (loupe.rows[0]?.cells.length ?? 0), sizeBytes)}</span></p>
          <StripGrid view={loupe} sizeBytes={sizeBytes} label={`Loupe around the differences. ${KEYS}`} cursor={where.in === "loupe" ? where.cell : null} onCursor={(cell) => setWhere({ in: "loupe", cell })} onOpen={onOpen} />
        </>
      ) : null}
      <div className="readout no-print">
        {words ? (
          <span className="contents" aria-live="off">
            <span>Cell <code className="font-semibold">{words.span}</code></span>
            <span>{words.says}</span>
            <b className={words.differs === "equal" ? "text-green" : "text-block"}>{words.differs}</b>
          </span>
        ) : <span className="text-ink-2">Click a cell to read its addresses.</span>}
        <span className="readout-buttons">
          {any ? (
            <>
              <Button size="small" onClick={() => jump(-1)}><Icon name="prev" />Previous <kbd className="key">P</kbd></Button>
              <Button size="small" onClick={() => jump(1)}>Next difference <kbd className="key">N</kbd><Icon name="next" /></Button>
            </>
          ) : null}
          {where.cell !== null ? <Button size="small" variant="text" onClick={() => onOpen(cellStart(looked, where.cell ?? 0))}>Open the bytes</Button> : null}
        </span>
      </div>
    </div>
  );
}

/** The two slanted lines that join the loupe to its place. */
function Leader({ stack }: { stack: StripStackView }) {
  if (!stack.loupe) return null;
  const count = stack.rows[0]?.cells.length ?? 256;
  const from = ((stack.loupe.offset / stack.sizeBytes) * count).toFixed(2);
  const to = (((stack.loupe.offset + stack.loupe.cellBytes * count) / stack.sizeBytes) * count).toFixed(2);
  return (
    <svg className="leader" viewBox={`0 0 ${count} 26`} preserveAspectRatio="none" aria-hidden="true">
      <path className="leader-fill" d={`M${from} 0H${to}V4L${count} 22V26H0V22L${from} 4Z`} />
      <path className="leader-line" vectorEffect="non-scaling-stroke" d={`M${from} 0V4L0 22V26M${to} 0V4L${count} 22V26`} />
    </svg>
  );
}
