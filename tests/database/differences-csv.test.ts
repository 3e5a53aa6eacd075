import { randomUUID } from "node:crypto";
import { expect, it } from "vitest";
import { correctChip } from "@/lib/commands/correct-chip";
import { comparedReads, differencesCsv } from "@/lib/queries/compare";
import { comparedInput } from "@/lib/schemas/read";
import { firmware, makeChip, makeUser, refusalOf, store } from "../support/factory";

const SIZE = 8192;

async function makeThree() {
  const technician = await makeUser("technician");
  const chip = await makeChip(technician, { sizeBytes: SIZE });
  const image = firmware(`csv-${randomUUID()}`, SIZE);
  const changed = (...places: [number, number][]) => {
    const copy = Buffer.from(image);
    for (const [at, value] of places) copy[at] ^= value;
    return copy;
  };
  for (const [bytes, seating] of [[changed([0x10, 1], [0x11, 1]), 1], [changed([0x11, 2], [0x1fff, 4]), 1], [image, 2]] as const) await store(technician, chip.chipId, "before", bytes, seating);
  return { technician, chip };
}

it("three reads give the ranges in which not all agree, and who stands alone, as CSV with CRLF", async () => {
  const { technician, chip } = await makeThree();
  const { text, fileName } = await differencesCsv(technician, chip.chipId, { reads: [1, 2, 3], stage: "before" });
  expect(fileName).toBe("U12-before-1-2-3-differences.csv");
  expect(text).toBe([
    "First address,Last address,Bytes,Stands alone", "0x0010,0x0010,1,Read 1", "0x0011,0x0011,1,no two agree", "0x1FFF,0x1FFF,1,Read 2", "",
  ].join("\r\n"));
  const view = await comparedReads(technician, chip.chipId, { reads: [1, 2, 3], stage: "before" });
  expect(view).toMatchObject({ equal: false, differingBytes: 3, differingBits: null, ranges: [{ start: 0x10, length: 2 }, { start: 0x1fff, length: 1 }] });
  expect(view.reads.map((r) => r.number)).toEqual([1, 2, 3]);
  expect(view.stack.rows).toHaveLength(3);
});

it("two reads give their ranges; a designator that a spreadsheet would run reaches only the file's name, spelled out", async () => {
  const { technician, chip } = await makeThree();
  await correctChip(technician, chip.chipId, { changes: { designator: "=U1+1" }, reason: "Printed so on the board." });
  const { text, fileName } = await differencesCsv(technician, chip.chipId, { reads: [1, 3], stage: "before" });
  expect(fileName).toBe("_3d_U1_2b_1-before-1-3-differences.csv");
  expect(text).toBe("First address,Last address,Bytes\r\n0x0010,0x0011,2\r\n");
  expect(await refusalOf(differencesCsv(technician, chip.chipId, { reads: [1, 9], stage: "before" }))).toMatchObject({ code: "not-found" });
  expect(comparedInput.safeParse({ reads: "1,2,2" }).success).toBe(false);
  expect(comparedInput.safeParse({ reads: "1,2,3,4" }).success).toBe(false);
});
