"use client";

import { useRef, useState } from "react";
import { Refusal } from "@/lib/http/send";

/**
 * Runs a change and keeps the server's sentence when it is refused. `attempt` answers whether it was done. What hands the
 * signal on to its call can be stopped.
 */
export function useChange(): { refusal: string | null; busy: boolean; attempt(change: (signal: AbortSignal) => Promise<unknown>): Promise<boolean>; stop(): void; clear(): void } {
  const [refusal, setRefusal] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const running = useRef<AbortController | null>(null);
  async function attempt(change: (signal: AbortSignal) => Promise<unknown>): Promise<boolean> {
    const mine = new AbortController();
    running.current = mine;
    setRefusal(null);
    setBusy(true);
    try {
      await change(mine.signal);
      return true;
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      const fields = (error.problem.errors ?? []).map((e) => e.message).filter((message) => !error.detail.includes(message));
      setRefusal([error.detail, ...new Set(fields)].join(" "));
      return false;
    } finally {
      setBusy(false);
    }
  }
  return { refusal, busy, attempt, stop: () => running.current?.abort(), clear: () => setRefusal(null) };
}
