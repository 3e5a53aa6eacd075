import { bytesFetcher } from "@/lib/http/send";
import { KIB } from "@/lib/limits";
import type { ReadView } from "@/lib/views";

/** Bytes asked for at a time: 1,024 lines. */
export const WINDOW_BYTES = 16 * KIB;
/** of all reads together: 3 MiB */
const KEPT = 192;
/** While somebody scrolls on, what is passed is never asked for: only where they rest this long, and every so often on the way. */
const REST_MS = 80;
const MOST_MS = 320;
/** as many as a browser sends to one server at a time: more would only be a longer piece of work at once */
const MOST_AT_ONCE = 6;

type Source = Pick<ReadView, "id" | "sizeBytes">;

export interface ByteCache {
  /** a read's window by its number; null until it is here, empty past the image's end */
  windowOf(read: Source, number: number): Uint8Array | null;
  /** What is looked at now: what is missing of it is fetched, what nobody looks at any more is given up. */
  look(reads: readonly Source[], numbers: readonly number[]): void;
  /** why the bytes looked at can't be had, or null */
  error(): Error | null;
  again(): void;
  subscribe(listener: () => void): () => void;
  /** grows with every change */
  version(): number;
  close(): void;
}

const EMPTY = new Uint8Array();

/** The windows of bytes that were looked at last. Stored images never change, so what is here is never asked for again. */
export function createByteCache(): ByteCache {
  const kept = new Map<string, Uint8Array>();
  const asked = new Map<string, AbortController>();
  const listeners = new Set<() => void>();
  /** what is looked at, and what was looked at when bytes were asked for last */
  let wanted: { key: string; path: string }[] = [];
  let due: typeof wanted = [];
  let timer: ReturnType<typeof setTimeout> | null = null;
  let askedAt = -MOST_MS;
  let error: Error | null = null;
  let version = 0;
  let told = true;
  /** once for all that came within a frame */
  const changed = () => {
    if (!told) return;
    told = false;
    requestAnimationFrame(() => {
      told = true;
      version += 1;
      for (const listener of listeners) listener();
    });
  };
  const keyOf = (read: Source, number: number) => `${read.id} ${number}`;

  function keep(key: string, bytes: Uint8Array): void {
    kept.delete(key);
    kept.set(key, bytes);
    for (const oldest of kept.keys()) {
      if (kept.size <= KEPT) break;
      kept.delete(oldest);
    }
  }

  async function fetchOne({ key, path }: { key: string; path: string }): Promise<void> {
    const controller = new AbortController();
    asked.set(key, controller);
    try {
      keep(key, await bytesFetcher(path, controller.signal));
      error = null;
    } catch (thrown) {
      if (controller.signal.aborted) return;
      error = thrown as Error;
    } finally {
      if (asked.get(key) === controller) asked.delete(key);
    }
    changed();
    fetchMore();
  }

  function fetchMore(): void {
    for (const one of due) {
      if (error || asked.size >= MOST_AT_ONCE) return;
      if (!kept.has(one.key) && !asked.has(one.key)) void fetchOne(one);
    }
  }

  /** what is on its way and none of these is given up, and makes room at once */
  function giveUpBut(keys: ReadonlySet<string>): void {
    for (const [key, controller] of asked) {
      if (keys.has(key)) continue;
      controller.abort();
      asked.delete(key);
    }
  }

  function fetchWanted(): void {
    timer = null;
    askedAt = performance.now();
    due = wanted;
    giveUpBut(new Set(due.map(({ key }) => key)));
    fetchMore();
  }

  return {
    windowOf: (read, number) => (number * WINDOW_BYTES >= read.sizeBytes ? EMPTY : kept.get(keyOf(read, number)) ?? null),
    look(reads, numbers) {
      wanted = numbers.flatMap((number) => reads.filter((read) => number * WINDOW_BYTES < read.sizeBytes).map((read) => {
        const offset = number * WINDOW_BYTES;
        return { key: keyOf(read, number), path: `/api/reads/${read.id}/bytes?offset=${offset}&length=${Math.min(WINDOW_BYTES, read.sizeBytes - offset)}` };
      }));
      if (timer) clearTimeout(timer);
      timer = setTimeout(fetchWanted, Math.min(REST_MS, Math.max(0, askedAt + MOST_MS - performance.now())));
    },
    error: () => error,
    again() {
      error = null;
      changed();
      fetchWanted();
    },
    subscribe(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    version: () => version,
    close() {
      if (timer) clearTimeout(timer);
      timer = null;
      due = [];
      giveUpBut(new Set());
    },
  };
}
