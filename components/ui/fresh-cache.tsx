"use client";

import type { ReactNode } from "react";
import { SWRConfig } from "swr";

/** Each visit of a page begins with what the server sent along: what an earlier visit fetched must not stand in its place. */
export function FreshCache({ children }: { children: ReactNode }) {
  return <SWRConfig value={{ provider: () => new Map() }}>{children}</SWRConfig>;
}
