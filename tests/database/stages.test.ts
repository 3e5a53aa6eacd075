import { describe, expect, it } from "vitest";
import { correctChip } from "@/lib/commands/correct-chip";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { revokeApproval } from "@/lib/commands/revoke-approval";
import { setReadAside } from "@/lib/commands/set-read-aside";
import { flipped, logged, makeWrittenBench, readNamed, refusal, view } from "../support/bench-steps";
import { approve, freshImage, makeApprovedBench, makeChip, makeReadyBench, makeUser, stateOf, store } from "../support/factory";

describe("a read is refused, with nothing stored,", () => {
  it("on the wrong board", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    for (const stage of ["donor", "after"] as const) {
      expect(await refusal(store(technician, chip.chipId, stage, freshImage()))).toMatchObject({
        status: 422, detail: "U12 is on the original board: its reads have the stage before. Send this one to the donor's chip.",
      });
    }
    expect(await refusal(store(technician, chip.donorChipId, "before", freshImage()))).toMatchObject({
      status: 422, detail: "U12 is on the donor board: its reads have the stage donor (own content) or after (read-back). Send reads of the original to the original's chip.",
    });
    expect((await view({ technician, chip })).reads).toEqual([]);
    expect(await logged(chip.driveId, "read.stored")).toEqual([]);
  });

  it("as a read-back before any transfer, cleared or not", async () => {
    const sentence = "No transfer to U12 is recorded yet. Record the write or the moved chip first, then send the read-back.";
    for (const bench of [await makeReadyBench(), await makeApprovedBench()]) {
      expect(await refusal(store(bench.technician, bench.chip.donorChipId, "after", bench.image))).toMatchObject({ status: 409, detail: sentence });
      expect((await view(bench)).reads.filter((r) => r.stage === "after")).toEqual([]);
    }
  });

  it("as the donor's own content once the donor was written, also after the approval fell", async () => {
    const bench = await makeWrittenBench();
    const sentence = "U12 has been written: what it holds now is no longer its own content. Send this as a read-back (stage after).";
    expect(await refusal(store(bench.technician, bench.chip.donorChipId, "donor", freshImage()))).toMatchObject({ status: 409, detail: sentence });
    await revokeApproval(bench.lead, bench.approvalId, { reason: "The label was misread." });
    expect(await refusal(store(bench.technician, bench.chip.donorChipId, "donor", freshImage()))).toMatchObject({ status: 409, detail: sentence });
  });

  it("from an auditor and an admin", async () => {
    const chip = await makeChip(await makeUser("technician"));
    for (const role of ["auditor", "admin"] as const) {
      expect(await refusal(store(await makeUser(role), chip.chipId, "before", freshImage()))).toMatchObject({ status: 403 });
    }
  });

  it("under a digest that is not its own, and when it is empty", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    expect(await refusal(store(technician, chip.chipId, "before", freshImage(), 1, { sha256: ["0".repeat(64)] }))).toMatchObject({
      status: 422, detail: expect.stringMatching(/^image\.bin changed on its way: .* Nothing was stored; send it again\.$/) as string,
    });
    expect(await refusal(store(technician, chip.chipId, "before", Buffer.alloc(0)))).toMatchObject({ status: 422, detail: expect.stringContaining("0 bytes") as string });
    expect((await view({ technician, chip })).reads).toEqual([]);
  });
});

describe("a transfer is refused", () => {
  it("to another donor chip than the one that was cleared, by whoever may not record it, and on a revoked approval", async () => {
    const bench = await makeApprovedBench();
    const write = { kind: "write" as const, donorChipId: bench.chip.donorChipId };
    expect(await refusal(recordTransfer(bench.technician, bench.approvalId, { ...write, donorChipId: bench.chip.chipId }))).toMatchObject({
      status: 409, detail: "The approval covers another donor chip. Write to that one, or ask a lead for a new approval.",
    });
    expect(await refusal(recordTransfer(await makeUser("auditor"), bench.approvalId, write))).toMatchObject({ status: 403 });
    await revokeApproval(bench.lead, bench.approvalId, { reason: "The label was misread." });
    expect(await refusal(recordTransfer(bench.technician, bench.approvalId, write))).toMatchObject({ status: 409 });
    expect(await logged(bench.chip.driveId, "transfer.recorded")).toEqual([]);
  });
});

describe("stages count apart", () => {
  it("numbers, seatings and groups of one stage say nothing about another", async () => {
    const bench = await makeWrittenBench();
    await store(bench.technician, bench.chip.donorChipId, "after", bench.image, 1);
    const { reads, nextSeating } = await view(bench);
    expect(reads.map((r) => `${r.stage} ${r.number}`).sort()).toEqual(["after 1", "before 1", "before 2", "before 3", "donor 1", "donor 2"]);
    expect(nextSeating).toEqual({ before: 3, donor: 2, after: 2 });
  });

  it("a read of the original is still stored after the write", async () => {
    const bench = await makeWrittenBench();
    await store(bench.technician, bench.chip.chipId, "before", bench.image, 3);
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("written");
  });

  it("a moved chip needs the same read-backs as a write", async () => {
    const bench = await makeApprovedBench();
    await recordTransfer(bench.technician, bench.approvalId, { kind: "chip-moved", donorChipId: bench.chip.donorChipId });
    for (const seating of [1, 1]) await store(bench.technician, bench.chip.donorChipId, "after", bench.image, seating);
    expect((await view(bench)).state).toMatchObject({ state: "written", sentence: "2 of 2 read-backs, 1 of 2 seatings: read back again in a new seating." });
    await store(bench.technician, bench.chip.donorChipId, "after", bench.image, 2);
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("verified");
  });
});

describe("a write that went wrong", () => {
  const wrong: [string, string, (image: Buffer, own: Buffer) => Buffer][] = [
    ["nothing was written", "write-refused", (_image, own) => own],
    ["it was erased only", "erased-only", (image) => Buffer.alloc(image.length, 0xff)],
    ["it was not erased", "not-erased", (image, own) => Buffer.from(image.map((byte, i) => byte & own[i]))],
    ["one bit differs", "weak-cells", (image) => flipped(image)],
  ];
  for (const [name, code, bytes] of wrong) {
    it(`is told apart: ${name}`, async () => {
      const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
      const chip = await makeChip(technician);
      const [image, own] = [freshImage(), freshImage()];
      for (const seating of [1, 1]) await store(technician, chip.donorChipId, "donor", own, seating);
      for (const seating of [1, 1, 2]) await store(technician, chip.chipId, "before", image, seating);
      const { id } = await approve(lead, chip, image);
      await recordTransfer(technician, id, { kind: "write", donorChipId: chip.donorChipId });
      await store(technician, chip.donorChipId, "after", bytes(image, own), 1);
      const bench = { technician, chip };
      const back = await readNamed(bench, "after", 1);
      expect(back.findings).toMatchObject([{ code, severity: "blocks" }]);
      expect((await view(bench)).state).toMatchObject({ state: "failed", label: "Write again" });
      expect(await logged(chip.driveId, "readback.differs")).toMatchObject([{ diagnosis: back.findings[0].message, transfer: back.transferId }]);
    });
  }

  it("starts the count afresh with a new transfer, and a lead may set the odd read-back aside", async () => {
    const bench = await makeWrittenBench();
    const back = (image: Buffer, seating: number) => store(bench.technician, bench.chip.donorChipId, "after", image, seating);
    const { reads: [odd] } = await back(flipped(bench.image), 1);
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("failed");
    await recordTransfer(bench.technician, bench.approvalId, { kind: "write", donorChipId: bench.chip.donorChipId });
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("written");
    const { reads: [second] } = await back(flipped(bench.image, 99), 2);
    for (const seating of [3, 4]) await back(bench.image, seating);
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("failed");
    expect(await refusal(setReadAside(bench.technician, second.id, { reason: "The clip slipped." }))).toMatchObject({ status: 403, detail: expect.stringMatching(/^Only a lead can set a read-back aside/) as string });
    await setReadAside(bench.lead, second.id, { reason: "The clip slipped." });
    expect(await stateOf(bench.technician, bench.chip.chipId)).toBe("verified");
    expect((await readNamed(bench, "after", odd.number)).counted).toBe(true);
  });

  it("does not bar a second donor: the first one's read-backs are no other chip's content", async () => {
    const bench = await makeWrittenBench();
    await store(bench.technician, bench.chip.donorChipId, "after", bench.image, 1);
    await correctChip(bench.technician, bench.chip.donorChipId, { changes: { pairedWith: null }, reason: "The donor's chip is cracked." });
    await store(bench.technician, bench.chip.chipId, "before", bench.image, 3);
    expect((await readNamed(bench, "before", 4)).findings).toEqual([]);
  });
});
