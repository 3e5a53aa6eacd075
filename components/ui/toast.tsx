"use client";

import Link from "next/link";
import { Toast as Radix } from "radix-ui";
import { createContext, useCallback, useContext, useState, type ReactNode } from "react";
import { Icon } from "./icon";
import { Mark } from "./mark";

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
      <Radix.Provider duration={8000} swipeDirection="left" label="Message">
        {children}
        {now ? (
          <Radix.Root key={now.key} type="background" onOpenChange={(open) => { if (!open) setNow(null); }}
            className="grid max-w-[520px] grid-cols-[16px_minmax(0,1fr)_auto_auto] items-center gap-3 bg-ink px-3.5 py-3 text-paper [--hole:var(--ink)]">
            <Mark kind="ok" className="!text-paper" />
            <Radix.Title>{now.text}</Radix.Title>
            {now.link ? <Radix.Action asChild altText={now.link.label}><Link href={now.link.href} className="text-paper font-semibold">{now.link.label}</Link></Radix.Action> : <span />}
            <Radix.Close aria-label="Close" className="grid h-6 w-6 place-items-center"><Icon name="close" /></Radix.Close>
          </Radix.Root>
        ) : null}
        <Radix.Viewport className="no-print fixed bottom-4 left-4 z-50 m-0 w-[min(520px,calc(100vw-32px))] list-none p-0" />
      </Radix.Provider>
    </Say.Provider>
  );
}
