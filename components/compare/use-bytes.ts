"use client";

import useSWR from "swr";
import { bytesFetcher } from "@/lib/http/send";
import { KIB } from "@/lib/limits";
import type { ReadView } from "@/lib/views";

export const STEP_BYTES = 4 * KIB;
const WINDOW_BYTES = 2 * STEP_BYTES;
const NONE = new Uint8Array();

/** The two steps of 4 KiB that start at the step of this address: what is at their border still has its surroundings. */
export function windowOf(at: number, sizeBytes: number): { offset: number; length: number } {
  const offset = Math.floor(at / STEP_BYTES) * STEP_BYTES;
  return { offset, length: Math.max(0, Math.min(WINDOW_BYTES, sizeBytes - offset)) };
}

/** A window of one read. Stored images never change, so what is here is never asked for again. */
export function useBytes(read: Pick<ReadView, "id" | "sizeBytes"> | null, offset: number, length: number): { bytes: Uint8Array | null; error: Error | null } {
  const here = Math.max(0, Math.min(length, (read?.sizeBytes ?? 0) - offset));
  const { data, error } = useSWR<Uint8Array, Error>(read && here > 0 ? `/api/reads/${read.id}/bytes?offset=${offset}&length=${here}` : null, bytesFetcher, { revalidateIfStale: false, revalidateOnFocus: false, revalidateOnReconnect: false });
  return { bytes: here > 0 ? data ?? null : NONE, error: error ?? null };
}
