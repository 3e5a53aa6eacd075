"use client";

import { useState } from "react";
import { Refusal } from "@/lib/http/send";

/** Runs a change and keeps the server's sentence when it is refused. `attempt` answers whether it was done. */
export function useChange(): { refusal: string | null; busy: boolean; attempt(change: () => Promise<unknown>): Promise<boolean>; clear(): void } {
  const [refusal, setRefusal] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  async function attempt(change: () => Promise<unknown>): Promise<boolean> {
    setRefusal(null);
    setBusy(true);
    try {
      await change();
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
  return { refusal, busy, attempt, clear: () => setRefusal(null) };
}
