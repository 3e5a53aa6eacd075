import { describe, expect, it } from "vitest";
import { inspectWhole } from "@/lib/core/inspect";
import { LEAST_IMAGES, realImages } from "@/scripts/engine/real-images";
import { falseAlarms, shareRight, sweep } from "@/scripts/engine/sweep";

/** One seed on the smaller real images; the large ones and more seeds are in tests/long. */
const SMALL = 132 * 1024;
const images = realImages();
const small = images.filter(({ bytes }) => bytes.length <= SMALL);

describe("real firmware", () => {
  it("is there: enough distinct images", () => {
    expect(images.map(({ name }) => name).length).toBeGreaterThanOrEqual(LEAST_IMAGES);
    expect(small.length).toBeGreaterThanOrEqual(LEAST_IMAGES);
  });
  it("raises nothing above note while unharmed", () => expect(falseAlarms(images)).toEqual([]));
  it("keeps its distance from the thresholds", () => {
    for (const { bytes } of images) {
      const { whole } = inspectWhole(bytes);
      expect(whole).toMatchObject({ noiseLike: false, alwaysOne: 0, everOne: 0xff, text: null, container: null, repeats: { short: null, period: null, lines: [] } });
    }
  });
});

describe("faults put into real firmware", () => {
  const outcomes = sweep(small, [7]);
  it("always leave the set not ready", () => {
    expect(outcomes.length).toBeGreaterThan(300);
    expect(outcomes.filter((one) => !one.held)).toEqual([]);
  });
  it("get the right code on images that are not nearly empty", () => {
    const full = outcomes.filter((one) => !one.nearlyEmpty);
    expect(shareRight(full)).toBeGreaterThanOrEqual(0.97);
    expect(shareRight(outcomes)).toBeGreaterThanOrEqual(0.9);
  });
});
