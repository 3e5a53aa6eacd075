import { describe, expect, it } from "vitest";
import { correctChip } from "@/lib/commands/correct-chip";
import { recordChip } from "@/lib/commands/record-chip";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { revokeApproval } from "@/lib/commands/revoke-approval";
import { countReadAgain, setReadAside } from "@/lib/commands/set-read-aside";
import { handOutImage } from "@/lib/commands/hand-out-image";
import { Approval } from "@/models";
import { approve, type Bench, freshImage, lastEntry, makeApprovedBench, makeReady, makeChip, makeUser, readsOf, refusalOf, sha256, stateOf, store } from "../support/factory";
import { damageImage } from "../support/tamper";

const WHY = { reason: "The clip slipped." };

/** The approval fell for this cause: in its row, in the log, in the state, and nothing can be written by it any more. */
async function expectFallen(bench: Bench & { approvalId: string }, cause: string, reason: RegExp): Promise<void> {
  const row = (await Approval.findByPk(bench.approvalId))!;
  expect(row.revokedCause).toBe(cause);
  expect(row.revokedReason).toMatch(reason);
  expect(await lastEntry(bench.chip.driveId, "approval.revoked")).toMatchObject({ approval: bench.approvalId, cause, sha256: sha256(bench.image) });
  expect(await stateOf(bench.technician, bench.chip.chipId)).not.toBe("approved");
  expect(await refusalOf(recordTransfer(bench.technician, bench.approvalId, { kind: "write", donorChipId: bench.chip.donorChipId })))
    .toEqual({ code: "rule-against", detail: expect.stringMatching(/^This approval was revoked/) });
}

describe("an approval falls", () => {
  it("by a lead, with the reason, and once only", async () => {
    const bench = await makeApprovedBench();
    const other = await makeUser("lead");
    await revokeApproval(other, bench.approvalId, { reason: "Wrong donor board." });
    await expectFallen(bench, "lead", /^Wrong donor board\.$/);
    expect(await refusalOf(revokeApproval(bench.lead, bench.approvalId, WHY))).toEqual({ code: "rule-against", detail: expect.stringMatching(/revoked already/) });
  });

  it("not by a technician", async () => {
    const bench = await makeApprovedBench();
    expect(await refusalOf(revokeApproval(bench.technician, bench.approvalId, WHY))).toMatchObject({ code: "forbidden" });
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("approved");
  });

  it("by a later counted read that differs, and not by one that is equal", async () => {
    const bench = await makeApprovedBench();
    await store(bench.technician, bench.chip.chipId, "before", bench.image, 3);
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("approved");
    const odd = Buffer.from(bench.image);
    odd[77] ^= 4;
    const { chip } = await store(bench.technician, bench.chip.chipId, "before", odd, 3);
    expect(chip?.state).toBe("reads-disagree");
    await expectFallen(bench, "differing-read", /^Read 5 differs from the approved image\.$/);
  });

  it("by a read of another size", async () => {
    const bench = await makeApprovedBench();
    await store(bench.technician, bench.chip.chipId, "before", bench.image.subarray(0, 4096), 3);
    await expectFallen(bench, "differing-read", /^Read 4 differs/);
  });

  it("by a differing read that is counted again", async () => {
    const bench = await makeApprovedBench();
    const odd = freshImage();
    const [technician, lead] = [bench.technician, bench.lead];
    const { reads: [read] } = await store(technician, bench.chip.chipId, "before", odd, 3);
    await setReadAside(technician, read.id, WHY);
    const approvalId = (await approve(lead, bench.chip, bench.image)).id;
    await countReadAgain(technician, read.id, { reason: "It was the right chip after all." });
    await expectFallen({ ...bench, approvalId }, "differing-read", /counted again/);
  });

  it("by reads set aside until too few are left, not before", async () => {
    const bench = await makeApprovedBench();
    await store(bench.technician, bench.chip.chipId, "before", bench.image, 1);
    const [first, second] = await readsOf(bench.technician, bench.chip.chipId, "before");
    await setReadAside(bench.technician, first.id, WHY);
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("approved");
    await setReadAside(bench.technician, second.id, WHY);
    await expectFallen(bench, "below-policy", /^Fewer than 3 counted reads in 2 seatings/);
  });

  it("by the one seating set aside that made it two", async () => {
    const bench = await makeApprovedBench();
    await store(bench.technician, bench.chip.chipId, "before", bench.image, 1);
    const other = (await readsOf(bench.technician, bench.chip.chipId, "before")).find((read) => read.seating === 2)!;
    await setReadAside(bench.technician, other.id, WHY);
    await expectFallen(bench, "below-policy", /in 2 seatings/);
  });

  it.each([["the original's", "chipId"], ["the donor's", "donorChipId"]] as const)("by a corrected size of %s chip", async (_whose, which) => {
    const bench = await makeApprovedBench();
    await correctChip(bench.technician, bench.chip[which], { changes: { sizeBytes: 16_384 }, reason: "Read the marking again." });
    await expectFallen(bench, "size-changed", /^The size of U12 was corrected\.$/);
  });

  it("not by a correction that leaves the size alone", async () => {
    const bench = await makeApprovedBench();
    await correctChip(bench.technician, bench.chip.chipId, { changes: { package: "SOIC-8", supplyMillivolts: 1800 }, reason: "Looked closer." });
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("approved");
  });

  it("by another donor chip that is paired in its place", async () => {
    const bench = await makeApprovedBench();
    await recordChip(bench.technician, bench.chip.donorBoardId, {
      designator: "U13", bus: "spi", sizeBytes: 8192, sizeSource: "marking", supplyMillivolts: 3300, needsTransfer: false, pairedWith: bench.chip.chipId,
    });
    await expectFallen(bench, "pair-changed", /paired with another donor chip/);
  });

  it("by a pair that is taken apart", async () => {
    const bench = await makeApprovedBench();
    await correctChip(bench.technician, bench.chip.donorChipId, { changes: { pairedWith: null }, reason: "Donor board is needed elsewhere." });
    await expectFallen(bench, "pair-changed", /no longer this chip's pair/);
  });

  it("by a stored image that is damaged, at the hand-out that finds it", async () => {
    const bench = await makeApprovedBench();
    const [read] = await readsOf(bench.technician, bench.chip.chipId, "before");
    const mend = damageImage(sha256(bench.image));
    try {
      await refusalOf(handOutImage(bench.technician, read.id, {}));
    } finally {
      mend();
    }
    await expectFallen(bench, "image-damaged", /^The stored image is damaged\.$/);
  });

  it("by a read that its approver takes", async () => {
    const bench = await makeApprovedBench();
    await store(bench.lead, bench.chip.chipId, "before", bench.image, 3);
    await expectFallen(bench, "approver-took-read", /has now taken a read of the original/);
  });

  it("and takes the write with it: the donor holds an image that is no longer cleared", async () => {
    const bench = await makeApprovedBench();
    await recordTransfer(bench.technician, bench.approvalId, { kind: "write", donorChipId: bench.chip.donorChipId });
    for (const seating of [1, 2]) await store(bench.technician, bench.chip.donorChipId, "after", bench.image, seating);
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("verified");
    await revokeApproval(bench.lead, bench.approvalId, WHY);
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("failed");
    // the way on: cleared anew, written anew, read back anew
    const again = await approve(bench.lead, bench.chip, bench.image);
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("failed");
    await recordTransfer(bench.technician, again.id, { kind: "write", donorChipId: bench.chip.donorChipId });
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("written");
  });

  it("and a second donor can be written after the first one's board turned out dead", async () => {
    const technician = await makeUser("technician");
    const lead = await makeUser("lead");
    const [chip, image] = [await makeChip(technician), freshImage()];
    await makeReady(technician, chip, image);
    const first = await approve(lead, chip, image);
    await recordTransfer(technician, first.id, { kind: "write", donorChipId: chip.donorChipId });
    for (const seating of [1, 2]) await store(technician, chip.donorChipId, "after", image, seating);
    const second = await recordChip(technician, chip.donorBoardId, {
      designator: "U14", bus: "spi", sizeBytes: 8192, sizeSource: "marking", supplyMillivolts: 3300, needsTransfer: false, pairedWith: chip.chipId,
    });
    for (const seating of [1, 1]) await store(technician, second.id, "donor", Buffer.alloc(8192, 0xff), seating);
    const again = await approve(lead, { ...chip, donorChipId: second.id }, image);
    await recordTransfer(technician, again.id, { kind: "write", donorChipId: second.id });
    await store(technician, second.id, "after", image, 1);
    expect((await store(technician, second.id, "after", image, 2)).chip?.state).toBe("verified");
  });
});
