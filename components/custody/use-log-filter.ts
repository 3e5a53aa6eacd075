"use client";

import { usePathname, useSearchParams } from "next/navigation";
import { useCallback, useEffect, useState } from "react";
import { filterOf, filterQuery, type LogFilter, WHOLE_LOG } from "./log-words";

/** The choice of what is shown, kept in the address: it can be sent to somebody, and stays after a reload. */
export function useLogFilter(): { filter: LogFilter; setFilter(filter: LogFilter): void } {
  const path = usePathname();
  const query = useSearchParams();
  const [filter, put] = useState(() => filterOf(query));
  const setFilter = useCallback((next: LogFilter) => {
    put(next);
    const words = filterQuery(next);
    // nothing is asked from the server: the whole chain is here already
    window.history.replaceState(null, "", words ? `${path}?${words}` : path);
  }, [path]);
  return { filter, setFilter };
}

/** Comes to one entry when asked: the filter gives way first, so that it is there. */
export function useComeTo(show: { seq: number } | null, setFilter: (filter: LogFilter) => void): void {
  useEffect(() => {
    if (!show) return;
    if (!document.getElementById(`entry-${show.seq}`)) setFilter(WHOLE_LOG);
    const frame = requestAnimationFrame(() => {
      const row = document.getElementById(`entry-${show.seq}`);
      row?.scrollIntoView({ block: "center" });
      row?.querySelector("button")?.focus({ preventScroll: true });
    });
    return () => cancelAnimationFrame(frame);
  }, [show, setFilter]);
}
