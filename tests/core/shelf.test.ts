import { expect, it } from "vitest";
import { byFit, readShelfNumber, shelfBytes, shelfFit, shelfNumber, shelfState } from "@/lib/core/shelf";

it("reads numbers of the shelf as people type them, and nothing else", () => {
  expect([1, 12, 12_345].map(shelfNumber)).toEqual(["D-0001", "D-0012", "D-12345"]);
  expect(["D-0012", " d-12 ", "D 12", "d12"].map(readShelfNumber)).toEqual([12, 12, 12, 12]);
  expect(["12", "D-0", "D-", "D--1", "26-0042", "D-1234567890", "D-1.5", ""].map(readShelfNumber)).toEqual(Array(8).fill(null));
});

it("reads sizes with and without a unit", () => {
  expect(["524288", "524,288", "512 KiB", "1 mib", "8192 bytes", "1 byte"].map(shelfBytes)).toEqual([524_288, 524_288, 524_288, 1_048_576, 8192, 1]);
  expect(["", "4 Mbit", "-1", "1.5 KiB", "KiB"].map(shelfBytes)).toEqual(Array(5).fill(null));
});

it("says taken before retired, and retired before reserved", () => {
  const state = (reserved: boolean, taken: boolean, retired: boolean) => shelfState({ reserved, taken, retired });
  expect([state(true, true, true), state(true, false, true), state(true, false, false), state(false, false, false)]).toEqual(["taken", "retired", "reserved", "on-shelf"]);
});

it("compares what is known of both boards, and says what is known of one only", () => {
  const original = { boardNumber: "BX 40-3179", revision: "rev C", controllerMarking: "KV-8810", motorDriverMarking: null };
  const needed = [{ designator: "U3", sizeBytes: 524_288 }, { designator: "U12", sizeBytes: 8192 }];
  const chips = [{ designator: "u3", sizeBytes: 524_288 }, { designator: "U12", sizeBytes: 8192 }];
  expect(shelfFit(original, needed, { ...original, boardNumber: "bx40-3179", chips })).toEqual({ verdict: "fits", differences: [], unknown: [] });
  expect(shelfFit(original, needed, { ...original, controllerMarking: null, motorDriverMarking: "MD 2206", chips: [{ designator: "U3", sizeBytes: null }] })).toEqual({
    verdict: "fits", differences: [], unknown: ["Its controller marking is not on record.", "The original’s motor driver marking is not on record.", "The size of its U3 is not on record.", "No U12 is on record for it."],
  });
  expect(shelfFit(original, needed, { ...original, chips: [{ designator: "U3", sizeBytes: 262_144 }, chips[1]] })).toEqual({ verdict: "caution", differences: ["Its U3 has 262,144 bytes; the original’s has 524,288."], unknown: [] });
  expect(shelfFit(original, [], { ...original, boardNumber: "BX 1", chips: [] }).verdict).toBe("other-number");
});

it("puts what can be taken first, then what differs least", () => {
  const board = (number: number, differences: number, unknown: number, reserved: "here" | "nobody" | "elsewhere") => ({ number, reserved, fit: { verdict: "fits" as const, differences: Array<string>(differences).fill("x"), unknown: Array<string>(unknown).fill("x") } });
  const sorted = [board(1, 0, 0, "elsewhere"), board(2, 1, 0, "here"), board(3, 0, 1, "nobody"), board(4, 0, 0, "nobody"), board(5, 0, 0, "here"), board(6, 0, 0, "nobody")].sort(byFit);
  expect(sorted.map((one) => one.number)).toEqual([5, 4, 6, 3, 2, 1]);
});
