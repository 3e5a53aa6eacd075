import { expect, it } from "vitest";
import { dayInWords, endOfDay, lastDayOf } from "@/lib/core/account-end";

it("ends an account at midnight in the workshop's zone, in nights when the clocks change too", () => {
  expect(endOfDay("2027-01-31", "UTC").toISOString()).toBe("2027-02-01T00:00:00.000Z");
  expect(endOfDay("2027-01-31", "Europe/Berlin").toISOString()).toBe("2027-01-31T23:00:00.000Z");
  expect(endOfDay("2027-07-31", "Europe/Berlin").toISOString()).toBe("2027-07-31T22:00:00.000Z");
  // 28 March 2027 has 23 hours there
  expect(endOfDay("2027-03-28", "Europe/Berlin").toISOString()).toBe("2027-03-28T22:00:00.000Z");
  // the clocks of these two leave out or repeat midnight itself
  expect(endOfDay("2027-09-04", "America/Santiago").toISOString()).toBe("2027-09-05T04:00:00.000Z");
  expect(endOfDay("2027-01-31", "Pacific/Kiritimati").toISOString()).toBe("2027-01-31T10:00:00.000Z");
  expect(endOfDay("2027-01-31", "Etc/GMT+12").toISOString()).toBe("2027-02-01T12:00:00.000Z");
});

it("gives the last day back, whatever the zone", () => {
  for (const zone of ["UTC", "Europe/Berlin", "America/Los_Angeles", "Asia/Kathmandu", "Pacific/Kiritimati", "Etc/GMT+12"]) {
    for (const day of ["2026-10-25", "2027-03-28", "2028-02-29", "2027-12-31"]) expect(lastDayOf(endOfDay(day, zone), zone), `${day} ${zone}`).toBe(day);
  }
});

it("says a day in words", () => {
  expect(dayInWords("2027-01-31")).toBe("31 January 2027");
});
