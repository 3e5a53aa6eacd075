import { randomBytes, randomUUID } from "node:crypto";
import { describe, expect, it } from "vitest";
import { chipView } from "@/lib/queries/chip-view";
import { inCommon } from "@/lib/queries/in-common";
import { recordOfChip } from "@/lib/queries/chip-records";
import { currentPolicy } from "@/lib/queries/policy";
import { ComparisonRow } from "@/models";
import { firmware, type MadeChip, makeChip, makeUser, store } from "../support/factory";

const SIZE = 8192;

/** Contact was lost for 64 bytes at this address. */
function lostAt(image: Buffer, at: number): Buffer {
  const copy = Buffer.from(image);
  copy.fill(0xff, at, at + 64);
  return copy;
}

async function makeReads(taken: (image: Buffer) => [Buffer, number][]): Promise<{ technician: Awaited<ReturnType<typeof makeUser>>; chip: MadeChip }> {
  const technician = await makeUser("technician");
  const chip = await makeChip(technician, { sizeBytes: SIZE });
  for (const [bytes, seating] of taken(firmware(`in-common-${randomUUID()}`, SIZE))) await store(technician, chip.chipId, "before", bytes, seating);
  return { technician, chip };
}

describe("what the reads that differ have in common", () => {
  it("is said under the verdict: their seating, and what they all look like", async () => {
    const { technician, chip } = await makeReads((image) => [[lostAt(image, 0x100), 1], [image, 2], [lostAt(image, 0x900), 1], [image, 3]]);
    const { why, state } = await chipView(technician, chip.chipId);
    expect(state.state).toBe("reads-disagree");
    expect(why).toContain("Reads 2 and 4 agree in all 8,192 bytes, seatings B and C. Reads 1 and 3 are the only ones from seating A. Reads 1 and 3 all look like lost contact.");
  });

  it("is left out where no two reads agree, and where all do", async () => {
    const apart = await makeReads((image) => [[lostAt(image, 0x100), 1], [image, 2], [lostAt(image, 0x900), 1]]);
    expect((await chipView(apart.technician, apart.chip.chipId)).why).not.toMatch(/look like|only one/);
    const equal = await makeReads((image) => [[image, 1], [image, 2]]);
    expect((await chipView(equal.technician, equal.chip.chipId)).why).not.toMatch(/look like|only one/);
  });

  it("rests on comparisons on record and computes none", async () => {
    const { chip } = await makeReads((image) => [[image, 1], [image, 2], [lostAt(image, 0x100), 3], [lostAt(image, 0x900), 3]]);
    const record = (await recordOfChip(chip.chipId))!;
    const policy = await currentPolicy();
    expect(await inCommon(record, policy)).toEqual(["Reads 3 and 4 are the only ones from seating C.", "Reads 3 and 4 all look like lost contact."]);
    for (const row of record.before.slice(2)) row.sha256 = randomBytes(32);
    const before = await ComparisonRow.count();
    // of images that were never compared only the seating is left to say
    expect(await inCommon(record, policy)).toEqual(["Reads 3 and 4 are the only ones from seating C."]);
    expect(await ComparisonRow.count()).toBe(before);
  });
});
