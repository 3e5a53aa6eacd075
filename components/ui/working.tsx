"use client";

import { useEffect, useLayoutEffect, useRef, useState } from "react";
import { Button } from "./button";
import { Mark } from "./mark";

/** Sooner than this nothing is said: it would be gone before it is read. */
const QUIET_SECONDS = 1;

/**
 * Stands for as long as something goes on, and shows from the second second: what is being done, how far, how long so far,
 * and either the way to stop it or why there is none. Mount it while it goes on.
 */
export function Working({ what, far, note, onStop, stop = "Stop", framed = false }: {
  /** "The bundle is being made" */
  what: string;
  /** "12,288 KiB so far"; changes too often to be read out */
  far?: string | null;
  note?: string;
  onStop?(): void;
  stop?: string;
  /** over the page, at its foot, where there is no place of its own for it */
  framed?: boolean;
}) {
  const [seconds, setSeconds] = useState(0);
  useEffect(() => {
    const began = performance.now();
    const clock = setInterval(() => setSeconds(Math.floor((performance.now() - began) / 1000)), 250);
    return () => clearInterval(clock);
  }, []);
  const place = useRef<HTMLDivElement>(null);
  useLayoutEffect(() => {
    const [mine, pressed] = [place.current, document.activeElement];
    return () => {
      if (!mine?.contains(document.activeElement)) return;
      // the button that stopped it goes with it: the focus goes back to what began it
      queueMicrotask(() => (pressed instanceof HTMLElement && pressed.isConnected ? pressed : document.getElementById("main"))?.focus({ preventScroll: true }));
    };
  }, []);
  const shown = seconds >= QUIET_SECONDS;
  return (
    <div ref={place} className={`no-print flex flex-wrap items-center gap-x-4 gap-y-1.5 text-left text-ink-2 ${framed && shown ? "fixed right-4 bottom-4 z-40 max-w-[min(520px,calc(100vw-32px))] border border-rule-2 border-l-4 border-l-copper-2 bg-sheet px-4 py-3 [--hole:var(--sheet)]" : ""}`}>
      <p className={`grid grid-cols-[16px_minmax(0,1fr)] gap-2.5 ${shown ? "" : "sr-only"}`}>
        {shown ? <Mark kind="run" className="mt-0.5" /> : null}
        <span className="[overflow-wrap:anywhere]"><span role="status">{shown ? `${what}. ${note ?? ""}` : ""}</span>{shown ? <span aria-hidden="true"> {far ? `${far}, ` : ""}{seconds} s so far.</span> : null}</span>
      </p>
      {shown && onStop ? <Button size="small" onClick={onStop}>{stop}</Button> : null}
    </div>
  );
}
