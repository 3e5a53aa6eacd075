import { randomUUID } from "node:crypto";
import { describe, expect, it } from "vitest";
import { approveImage } from "@/lib/commands/approve-image";
import { makeComposite } from "@/lib/commands/make-composite";
import type { Actor } from "@/lib/core/words";
import { chipView } from "@/lib/queries/chip-view";
import { checkCustody } from "@/lib/queries/custody";
import { votes } from "@/lib/queries/votes";
import { type MadeChip, makeChip, makeUser, sha256, store, firmware } from "../support/factory";

const SIZE = 8192;
const REASON = "No two reads agree; the chip is corroded and gives no more.";

function withFlips(image: Buffer, seed: number): Buffer {
  const copy = Buffer.from(image);
  // a few single bits, at places of this read's own
  for (let i = 0; i < 4; i += 1) copy[(seed * 997 + i * 131) % SIZE] ^= 1 << (seed % 8);
  return copy;
}

/** Five reads in two seatings of which no two agree, over an image of dense data; the donor's content is saved. */
async function makeNoisy(): Promise<{ technician: Actor; lead: Actor; chip: MadeChip; image: Buffer }> {
  const technician = await makeUser("technician");
  const lead = await makeUser("lead");
  const chip = await makeChip(technician, { sizeBytes: SIZE });
  const image = firmware(`composite-${randomUUID()}`, SIZE);
  for (const seating of [1, 1]) await store(technician, chip.donorChipId, "donor", Buffer.alloc(SIZE, 0xff), seating);
  for (const [i, seating] of [1, 1, 1, 2, 2].entries()) await store(technician, chip.chipId, "before", withFlips(image, i + 1), seating);
  return { technician, lead, chip, image };
}

describe("a composite", () => {
  it("holds what most reads hold, stands for its voters, and is approved only with a written reason", async () => {
    const { technician, lead, chip, image } = await makeNoisy();
    expect((await chipView(lead, chip.chipId)).state.state).toBe("reads-disagree");
    const made = await makeComposite(lead, chip.chipId, { reads: [1, 2, 3, 4, 5], reason: REASON });
    expect(made.sha256).toBe(sha256(image));
    expect(made.derived).toMatchObject({ method: "bit majority, n=5", voters: expect.arrayContaining([1, 2, 3, 4, 5]) });
    const view = await chipView(lead, chip.chipId);
    expect(view.state.state).toBe("held");
    expect(view.reads.filter((r) => r.stage === "before" && r.counted).map((r) => r.number)).toEqual([6]);
    const other = await makeUser("lead");
    const ask = { sha256: made.sha256, donorChipId: chip.donorChipId, statement: "Voted, looked at each byte.", lookedAt: [] };
    await expect(approveImage(other, chip.chipId, { ...ask, reasons: {} })).rejects.toMatchObject({ code: "rule-against" });
    const codes = [...new Set(made.findings.filter((f) => f.severity === "reason").map((f) => f.code))];
    expect(codes).toContain("derived");
    const reasons = Object.fromEntries(codes.map((code) => [code, "Five reads, every disputed byte has a clear majority."]));
    await expect(approveImage(lead, chip.chipId, { ...ask, reasons })).rejects.toThrow(/took a read/);
    await approveImage(other, chip.chipId, { ...ask, reasons });
    expect((await chipView(technician, chip.chipId)).state.state).toBe("approved");
    expect((await checkCustody(chip.driveId)).findings).toEqual([]);
  });

  it("shows who voted what for each disputed byte", async () => {
    const { lead, chip, image } = await makeNoisy();
    const made = await makeComposite(lead, chip.chipId, { reads: [5, 3, 1, 2, 4], reason: REASON });
    const report = await votes(lead, made.id);
    expect(report.sha256).toBe(made.sha256);
    expect(report.disputed.length).toBeGreaterThan(0);
    for (const byte of report.disputed) {
      expect(byte.chosen).toBe(image[byte.at]);
      expect(byte.values).toHaveLength(5);
    }
  });

  it("is refused to a technician, to two reads, to reads of one seating and to reads that agree", async () => {
    const { technician, lead, chip, image } = await makeNoisy();
    await expect(makeComposite(technician, chip.chipId, { reads: [1, 2, 3], reason: REASON })).rejects.toMatchObject({ code: "forbidden" });
    await expect(makeComposite(lead, chip.chipId, { reads: [1, 2, 3], reason: REASON })).rejects.toThrow(/seating/);
    await expect(makeComposite(lead, chip.chipId, { reads: [1, 2, 99], reason: REASON })).rejects.toThrow(/no Read 99/);
    for (const seating of [1, 2, 3]) await store(technician, chip.chipId, "before", image, seating);
    await expect(makeComposite(lead, chip.chipId, { reads: [1, 4, 6, 7, 8], reason: REASON })).rejects.toThrow(/equal reads beat a vote/);
    expect((await chipView(lead, chip.chipId)).reads.filter((r) => r.derived)).toEqual([]);
  });

  it("is refused with the name of the read that may not vote, and why: by its own finding or by what it looks like beside the others", async () => {
    const { technician, lead, chip, image } = await makeNoisy();
    await store(technician, chip.chipId, "before", Buffer.alloc(SIZE, 0xff), 3);
    await store(technician, chip.chipId, "before", Buffer.concat([image.subarray(1), Buffer.of(0x5a)]), 3);
    await expect(makeComposite(lead, chip.chipId, { reads: [1, 4, 6], reason: REASON })).rejects.toMatchObject({
      code: "rule-against", detail: "Read 6 may not vote because it is blank, so only 2 reads are left of the 3 that a composite needs: take more reads.",
    });
    await expect(makeComposite(lead, chip.chipId, { reads: [1, 4, 7], reason: REASON })).rejects.toThrow(
      "Read 7 may not vote because it is shifted by bytes, so only 2 reads are left of the 3 that a composite needs: take more reads.");
    const made = await makeComposite(lead, chip.chipId, { reads: [1, 2, 4, 6, 7], reason: REASON });
    expect(made.derived).toMatchObject({ voters: expect.arrayContaining([1, 2, 4]), excluded: expect.arrayContaining([6, 7]) });
  });
});
