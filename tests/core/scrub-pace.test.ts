import { describe, expect, it } from "vitest";
import { dueAgeMs, keepsUp, roundMs, wholeStoreMs } from "@/lib/core/scrub-pace";

const HOUR = 3_600_000;
const DAY = 24 * HOUR;

describe("when a stored image is due to be read again", () => {
  it("leaves a seventh of the time for a small store", () => {
    expect(dueAgeMs(7, 0)).toBe(6 * DAY);
    expect(dueAgeMs(1, 0)).toBeCloseTo((6 / 7) * DAY, 3);
    expect(roundMs(7, 0)).toBe(3 * DAY);
  });
  it("begins earlier the longer one reading takes, so that it still ends in time", () => {
    const whole = wholeStoreMs(1024 ** 4, 20 * 1024 ** 2);
    expect(whole / HOUR).toBeCloseTo(14.56, 2);
    expect(dueAgeMs(7, whole)).toBe(7 * DAY - 2 * whole);
    for (const hours of [0, 1, 10, 50, 80]) expect(dueAgeMs(7, hours * HOUR) + hours * HOUR).toBeLessThanOrEqual(7 * DAY);
  });
  it("never falls under an hour, however slow the disk", () => {
    expect(dueAgeMs(7, 100 * DAY)).toBe(HOUR);
  });
  it("says whether the oldest is within the days", () => {
    expect(keepsUp(7, null)).toBe(true);
    expect(keepsUp(7, 7 * DAY)).toBe(true);
    expect(keepsUp(7, 7 * DAY + 1)).toBe(false);
  });
});
