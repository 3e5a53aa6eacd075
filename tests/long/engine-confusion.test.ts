import { expect, it } from "vitest";
import { realImages } from "@/scripts/engine/real-images";
import { falseAlarms, shareRight, sweep } from "@/scripts/engine/sweep";

it("names at least 97 % of faults in every real image rightly, lets none through and cries no wolf", () => {
  const images = realImages();
  const outcomes = sweep(images, [11, 12, 13, 14, 15, 16]);
  expect(outcomes.filter((one) => !one.held)).toEqual([]);
  expect(shareRight(outcomes.filter((one) => !one.nearlyEmpty))).toBeGreaterThanOrEqual(0.97);
  expect(falseAlarms(images)).toEqual([]);
});
