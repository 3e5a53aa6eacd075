/** When a stored image is due to be read again, and whether the checking keeps up. Times in milliseconds. */

const HOUR_MS = 3_600_000;
const DAY_MS = 24 * HOUR_MS;

/** How long one reading of the whole store takes at a pace of so many bytes a second. */
export function wholeStoreMs(bytes: number, bytesPerSecond: number): number {
  return (bytes / bytesPerSecond) * 1000;
}

/**
 * The age at which an image is due, so that each is read within `days`: early enough that the whole store fits in twice
 * over, a seventh of the time before the end at the latest. Never less than an hour, for the sake of the logs.
 */
export function dueAgeMs(days: number, wholeMs: number): number {
  const whole = days * DAY_MS;
  return Math.max(HOUR_MS, whole - Math.max(whole / 7, 2 * wholeMs));
}

/** What was read no longer ago than this counts as read in the round that is under way. */
export function roundMs(days: number, wholeMs: number): number {
  return dueAgeMs(days, wholeMs) / 2;
}

export function keepsUp(days: number, oldestAgeMs: number | null): boolean {
  return oldestAgeMs === null || oldestAgeMs <= days * DAY_MS;
}
