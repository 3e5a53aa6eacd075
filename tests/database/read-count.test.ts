import { describe, expect, it } from "vitest";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { countReadAgain, setReadAside } from "@/lib/commands/set-read-aside";
import { freshImage, lastEntry, makeApprovedBench, makeChip, makeUser, readsOf, refusalOf, sha256, stateOf, store } from "../support/factory";

const WHY = { reason: "The clip slipped." };

describe("a read that is set aside", () => {
  it("stays where it is, with who, when and why, and can be counted again", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    const image = freshImage();
    const { reads: [read] } = await store(technician, chip.chipId, "before", image);
    await setReadAside(technician, read.id, WHY);
    expect(await readsOf(technician, chip.chipId, "before")).toMatchObject([{ id: read.id, counted: false, sha256: sha256(image), setAside: { reason: WHY.reason, by: { id: technician.id } } }]);
    expect(await lastEntry(chip.driveId, "read.set-aside")).toMatchObject({ read: { id: read.id, number: 1 }, sha256: sha256(image), reason: WHY.reason });
    expect(await stateOf(technician, chip.chipId)).toBe("unread");
    expect(await refusalOf(setReadAside(technician, read.id, WHY))).toEqual({ code: "rule-against", detail: "Read 1 is set aside already." });
    await countReadAgain(technician, read.id, { reason: "It was fine." });
    expect(await readsOf(technician, chip.chipId, "before")).toMatchObject([{ counted: true, setAside: null }]);
    expect(await refusalOf(countReadAgain(technician, read.id, WHY))).toEqual({ code: "rule-against", detail: "Read 1 is counted already." });
    expect(await lastEntry(chip.driveId, "read.counted-again")).toMatchObject({ reason: "It was fine." });
    // a number is given once, whatever becomes of its read
    expect((await store(technician, chip.chipId, "before", image)).reads[0].number).toBe(2);
  });

  it("is no matter for another technician, an auditor or an admin; a lead may", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    const { reads: [read] } = await store(technician, chip.chipId, "before", freshImage());
    for (const role of ["technician", "auditor", "admin"] as const) {
      expect(await refusalOf(setReadAside(await makeUser(role), read.id, WHY))).toMatchObject({ code: "forbidden" });
    }
    expect((await readsOf(technician, chip.chipId, "before"))[0].counted).toBe(true);
    await setReadAside(await makeUser("lead"), read.id, WHY);
  });

  it("is for a lead alone once it is a read-back", async () => {
    const { technician, lead, chip, image, approvalId } = await makeApprovedBench();
    await recordTransfer(technician, approvalId, { kind: "write", donorChipId: chip.donorChipId });
    await store(technician, chip.donorChipId, "after", image, 1);
    const { reads: [odd] } = await store(technician, chip.donorChipId, "after", freshImage(), 2);
    expect(await stateOf(technician, chip.chipId)).toBe("failed");
    expect(await refusalOf(setReadAside(technician, odd.id, WHY))).toEqual({ code: "forbidden", detail: expect.stringMatching(/^Only a lead can set a read-back aside/) });
    await setReadAside(lead, odd.id, WHY);
    expect(await stateOf(technician, chip.chipId)).toBe("written");
    await store(technician, chip.donorChipId, "after", image, 2);
    expect(await stateOf(technician, chip.chipId)).toBe("verified");
  });

  it("no longer starts the count of a new transfer with the read-backs of the one before", async () => {
    const { technician, chip, image, approvalId } = await makeApprovedBench();
    await recordTransfer(technician, approvalId, { kind: "write", donorChipId: chip.donorChipId });
    await store(technician, chip.donorChipId, "after", freshImage(), 1);
    expect(await stateOf(technician, chip.chipId)).toBe("failed");
    await recordTransfer(technician, approvalId, { kind: "chip-moved", donorChipId: chip.donorChipId });
    expect(await stateOf(technician, chip.chipId)).toBe("written");
    for (const seating of [1, 2]) await store(technician, chip.donorChipId, "after", image, seating);
    expect(await stateOf(technician, chip.chipId)).toBe("verified");
  });
});

describe("a read is refused", () => {
  it("with a stage that is not its board's", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    for (const [id, stage] of [[chip.chipId, "donor"], [chip.chipId, "after"], [chip.donorChipId, "before"]] as const) {
      expect(await refusalOf(store(technician, id, stage, freshImage()))).toEqual({ code: "does-not-fit", detail: expect.stringMatching(/^U12 is on the (original|donor) board/) });
    }
  });

  it("as a read-back before any transfer, and as the donor's own content after one", async () => {
    const { technician, chip, image, approvalId } = await makeApprovedBench();
    expect(await refusalOf(store(technician, chip.donorChipId, "after", image))).toEqual({ code: "rule-against", detail: expect.stringMatching(/^No transfer to U12 is recorded yet\./) });
    await recordTransfer(technician, approvalId, { kind: "write", donorChipId: chip.donorChipId });
    expect(await refusalOf(store(technician, chip.donorChipId, "donor", image))).toEqual({ code: "rule-against", detail: expect.stringMatching(/^U12 has been written/) });
    await store(technician, chip.donorChipId, "after", image);
  });

  it("from an auditor and an admin", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    for (const role of ["auditor", "admin"] as const) {
      expect(await refusalOf(store(await makeUser(role), chip.chipId, "before", freshImage()))).toMatchObject({ code: "forbidden" });
    }
  });
});

describe("a copy of a file", () => {
  const at = (modifiedAt: string) => ({ modifiedAt: [modifiedAt] });

  it("is not a second read when digest, name and modification time are equal", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    const image = freshImage();
    await store(technician, chip.chipId, "before", image, 1, at("2026-11-30T08:00:00Z"), "u12.bin");
    const { reads: [copy] } = await store(technician, chip.chipId, "before", image, 2, at("2026-11-30T08:00:00Z"), "u12.bin");
    expect(copy.findings).toMatchObject([{ code: "copy-not-a-read", severity: "reason" }]);
  });

  it("is not suspected where one of the three differs or the time is not known", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    const image = freshImage();
    await store(technician, chip.chipId, "before", image, 1, at("2026-11-30T08:00:00Z"), "u12.bin");
    const others = [
      await store(technician, chip.chipId, "before", image, 2, at("2026-11-30T08:00:00.001Z"), "u12.bin"),
      await store(technician, chip.chipId, "before", image, 2, at("2026-11-30T08:00:00Z"), "u12-2.bin"),
      await store(technician, chip.chipId, "before", image, 2, {}, "u12.bin"),
      await store(technician, chip.chipId, "before", freshImage(), 2, at("2026-11-30T08:00:00Z"), "u12.bin"),
    ];
    for (const { reads: [read] } of others) expect(read.findings).toEqual([]);
  });
});
