const HOUR_MS = 3_600_000;
const MOST_KEYS = 10_000;

/**
 * Counts by key what happened within the last hour, in memory, because it decides nothing but a pause. `note` gives null
 * and counts, or the milliseconds until there is room again.
 */
export function hourly(most: number): { note(key: string, now?: number): number | null } {
  const counted = new Map<string, number[]>();
  return {
    note(key, now = Date.now()) {
      const recent = (counted.get(key) ?? []).filter((at) => at > now - HOUR_MS);
      if (recent.length >= most) return recent[0] + HOUR_MS - now;
      // the map forgets the oldest keys first: a flood of them can't fill the memory
      counted.delete(key);
      counted.set(key, [...recent, now]);
      for (const oldest of counted.keys()) {
        if (counted.size <= MOST_KEYS) break;
        counted.delete(oldest);
      }
      return null;
    },
  };
}
