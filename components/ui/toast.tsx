"use client";

import Link from "next/link";
import { createContext, useCallback, useContext, useEffect, useRef, useState, type ReactNode } from "react";
import { Icon } from "./icon";
import { Mark } from "./mark";

const SHOWN_MS = 8_000;

interface Saying {
  text: string;
  /** where to look at what was done */
  link?: { href: string; label: string };
}

const Say = createContext<(saying: Saying) => void>(() => undefined);

/** Says what was done: bottom left, one at a time, 8 s. Never for errors: those stay where they arose. */
export function useSay(): (saying: Saying) => void {
  return useContext(Say);
}

export function ToastProvider({ children }: { children: ReactNode }) {
  const [now, setNow] = useState<(Saying & { key: number }) | null>(null);
  const say = useCallback((saying: Saying) => setNow((before) => ({ ...saying, key: (before?.key ?? 0) + 1 })), []);
  return (
    <Say.Provider value={say}>
      {children}
      {/* always there: what is read aloud is a change within it */}
      <div role="status" aria-label="Message" className="no-print fixed bottom-4 left-4 z-50 w-[min(520px,calc(100vw-32px))]">
        {now ? <Toast key={now.key} text={now.text} link={now.link} onEnd={() => setNow(null)} /> : null}
      </div>
    </Say.Provider>
  );
}

/** Its time stands still while the pointer or the focus is on it. */
function Toast({ text, link, onEnd }: Saying & { onEnd(): void }) {
  const box = useRef<HTMLDivElement>(null);
  const [held, setHeld] = useState(false);
  const end = useRef(onEnd);
  useEffect(() => {
    end.current = onEnd;
  }, [onEnd]);
  useEffect(() => {
    if (held) return;
    const timer = setTimeout(() => end.current(), SHOWN_MS);
    return () => clearTimeout(timer);
  }, [held]);
  function close() {
    if (box.current?.contains(document.activeElement)) document.getElementById("main")?.focus({ preventScroll: true });
    onEnd();
  }
  return (
    <div ref={box} onPointerEnter={() => setHeld(true)} onPointerLeave={() => setHeld(false)} onFocus={() => setHeld(true)} onBlur={() => setHeld(false)} onKeyDown={(event) => { if (event.key === "Escape") close(); }}
      className="grid grid-cols-[16px_minmax(0,1fr)_auto_auto] items-center gap-3 bg-ink px-3.5 py-3 text-paper [--hole:var(--ink)]">
      <Mark kind="ok" className="!text-paper" />
      <span>{text}</span>
      {link ? <Link href={link.href} className="text-paper font-semibold">{link.label}</Link> : <span />}
      <button type="button" aria-label="Close" onClick={close} className="grid h-6 w-6 place-items-center"><Icon name="close" /></button>
    </div>
  );
}
