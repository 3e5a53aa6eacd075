"use client";

import { useEffect, useState } from "react";

const FIRST = 24;
const MORE = 32;

/**
 * How many of so many lines stand on the page by now: some at once, the others a few at a time, so that keys and pointer
 * never wait for 500 lines. Begins anew with another `key`.
 */
export function useGrowing(key: string, total: number): number {
  const [shown, setShown] = useState({ key, count: FIRST });
  const count = shown.key === key ? shown.count : FIRST;
  useEffect(() => {
    if (count >= total) return;
    const timer = setTimeout(() => setShown({ key, count: count + MORE }));
    return () => clearTimeout(timer);
  }, [key, count, total]);
  return Math.min(count, total);
}
