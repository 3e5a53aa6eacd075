import { describe, expect, it } from "vitest";
import { correctBoard } from "@/lib/commands/correct-board";
import { correctChip } from "@/lib/commands/correct-chip";
import { correctDrive } from "@/lib/commands/correct-drive";
import { createCase } from "@/lib/commands/create-case";
import { recordBoard } from "@/lib/commands/record-board";
import { recordChip } from "@/lib/commands/record-chip";
import { recordDrive } from "@/lib/commands/record-drive";
import type { Actor } from "@/lib/core/words";
import { Chip } from "@/models";
import { freshImage, lastEntry, logOf, makeChip, makeUser, readsOf, refusalOf, stateOf, store } from "../support/factory";

const CHIP = { bus: "spi", sizeBytes: 8192, sizeSource: "marking", supplyMillivolts: "unknown", needsTransfer: true } as const;

async function driveWith(actor: Actor, original: { boardNumber: string; revision?: string; controllerMarking?: string }): Promise<string> {
  const made = await createCase(actor, { customer: { name: "Oakhanger Press", email: "post@oakhanger.example" }, damage: "Water" });
  const drive = await recordDrive(actor, made.id, { partNumber: "PN 7002-0001-A" });
  await recordBoard(actor, drive.id, { role: "original", ...original });
  return drive.id;
}

describe("a donor board", () => {
  it("fits with the same number in another spelling, and with a caution where something else differs", async () => {
    const technician = await makeUser("technician");
    const drive = await driveWith(technician, { boardNumber: "BX 40-3179", revision: "rev C", controllerMarking: "K9-220" });
    expect((await recordBoard(technician, drive, { role: "donor", boardNumber: "bx40-3179", revision: "REV C" })).fit).toEqual({ verdict: "fits", differences: [] });
    const { fit } = await recordBoard(technician, drive, { role: "donor", boardNumber: "BX 40-3179", revision: "rev D", controllerMarking: "K9-330" });
    expect(fit).toEqual({ verdict: "caution", differences: ["Another revision: rev D; the original has rev C.", "Another controller marking: K9-330; the original has K9-220."] });
  });

  it("of another number is refused to a technician, and taken from a lead with a reason that the log keeps", async () => {
    const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
    const drive = await driveWith(technician, { boardNumber: "BX 40-3179" });
    const other = { role: "donor", boardNumber: "BX 41-0001" } as const;
    expect(await refusalOf(recordBoard(technician, drive, { ...other, reason: "It looks the same." }))).toMatchObject({ code: "rule-against" });
    expect(await refusalOf(recordBoard(lead, drive, other))).toMatchObject({ code: "does-not-fit" });
    await recordBoard(lead, drive, { ...other, reason: "The maker's list says that they are one." });
    expect(await lastEntry(drive, "board.recorded")).toMatchObject({ boardNumber: "BX 41-0001", fit: { verdict: "other-number", reason: "The maker's list says that they are one." } });
  });

  it("comes after the original, of which there is one", async () => {
    const technician = await makeUser("technician");
    const made = await createCase(technician, { customer: { name: "Oakhanger Press", email: "post@oakhanger.example" }, damage: "Water" });
    const drive = await recordDrive(technician, made.id, { model: "Enclosure, unmarked" });
    expect(await refusalOf(recordBoard(technician, drive.id, { role: "donor", boardNumber: "BX 1" }))).toMatchObject({ code: "rule-against" });
    await recordBoard(technician, drive.id, { role: "original", boardNumber: "BX 1" });
    expect(await refusalOf(recordBoard(technician, drive.id, { role: "original", boardNumber: "BX 1" }))).toMatchObject({ code: "rule-against" });
  });

  it("that a correction would turn into a misfit needs a lead", async () => {
    const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
    const { originalBoardId, driveId } = await makeChip(technician);
    const correction = { changes: { boardNumber: "BX 40-3188" }, reason: "The last two digits were smudged." };
    expect(await refusalOf(correctBoard(technician, originalBoardId, correction))).toMatchObject({ code: "rule-against" });
    expect(await lastEntry(driveId, "board.corrected")).toBeUndefined();
    await correctBoard(lead, originalBoardId, correction);
    expect(await lastEntry(driveId, "board.corrected")).toEqual({ changes: [{ field: "boardNumber", from: "BX 40-3179", to: "BX 40-3188" }], reason: correction.reason });
  });
});

describe("a pair", () => {
  it("is one donor chip at a time", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    const second = await recordChip(technician, chip.donorBoardId, { ...CHIP, designator: "U13", pairedWith: chip.chipId });
    expect((await Chip.findByPk(chip.donorChipId))!.pairedWithId).toBeNull();
    expect((await Chip.findByPk(second.id))!.pairedWithId).toBe(chip.chipId);
    expect(await lastEntry(chip.driveId, "chip.paired")).toMatchObject({ chip: { id: chip.chipId }, donorChip: { id: second.id }, before: { id: chip.donorChipId } });
    await correctChip(technician, chip.donorChipId, { changes: { pairedWith: chip.chipId }, reason: "The first one was right." });
    expect((await Chip.findByPk(second.id))!.pairedWithId).toBeNull();
  });

  it("stays between the original board and a donor board of one drive", async () => {
    const technician = await makeUser("technician");
    const [chip, other] = [await makeChip(technician), await makeChip(technician)];
    const pairTo = (pairedWith: string) => correctChip(technician, chip.donorChipId, { changes: { pairedWith }, reason: "Paired by mistake." });
    for (const wrong of [other.chipId, other.donorChipId, chip.donorChipId, chip.driveId]) expect(await refusalOf(pairTo(wrong))).toMatchObject({ code: "does-not-fit" });
    expect(await refusalOf(correctChip(technician, chip.chipId, { changes: { pairedWith: other.chipId }, reason: "The other way round." }))).toMatchObject({ code: "does-not-fit" });
    expect(await refusalOf(recordChip(technician, chip.originalBoardId, { ...CHIP, designator: "U9", pairedWith: chip.chipId }))).toMatchObject({ code: "does-not-fit" });
    expect((await Chip.findByPk(chip.donorChipId))!.pairedWithId).toBe(chip.chipId);
  });

  it("that is taken apart leaves an entry with from, to and reason, also without an approval to fall", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    await correctChip(technician, chip.donorChipId, { changes: { pairedWith: null }, reason: "This donor goes to another drive." });
    expect(await lastEntry(chip.driveId, "chip.corrected")).toEqual({
      chip: { id: chip.donorChipId, designator: "U12" }, changes: [{ field: "pairedWith", from: "original U12", to: null }], reason: "This donor goes to another drive.",
    });
  });
});

describe("a correction", () => {
  it("says in the log what stood there, what stands there now, and why; a refused one leaves nothing", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician, { serialNumber: "SN-OLD" });
    await correctDrive(technician, chip.driveId, { changes: { serial: "SN-NEW", model: null }, reason: "Misread the label." });
    expect(await lastEntry(chip.driveId, "drive.corrected")).toEqual({ changes: [{ field: "serial", from: "SN-OLD", to: "SN-NEW" }], reason: "Misread the label." });
    await correctChip(technician, chip.chipId, { changes: { supplyMillivolts: "unknown", designator: "U21" }, reason: "Looked closer." });
    expect(await lastEntry(chip.driveId, "chip.corrected")).toMatchObject({ changes: [{ field: "designator", from: "U12", to: "U21" }, { field: "supplyMillivolts", from: 3300, to: null }] });
    const entries = (await logOf(chip.driveId)).length;
    expect(await refusalOf(correctDrive(technician, chip.driveId, { changes: { serial: "SN-NEW" }, reason: "Again." }))).toMatchObject({ code: "does-not-fit" });
    expect(await refusalOf(correctDrive(technician, chip.driveId, { changes: { serial: null, partNumber: null }, reason: "Take all away." }))).toMatchObject({ code: "does-not-fit" });
    expect(await refusalOf(correctChip(technician, chip.chipId, { changes: { designator: "U21" }, reason: "Again." }))).toMatchObject({ code: "does-not-fit" });
    for (const role of ["auditor", "admin"] as const) {
      expect(await refusalOf(correctDrive(await makeUser(role), chip.driveId, { changes: { serial: "SN-X" }, reason: "Not mine." }))).toMatchObject({ code: "forbidden" });
    }
    expect((await logOf(chip.driveId)).length).toBe(entries);
  });

  it("of a chip's size judges its reads afresh", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    const image = freshImage(16_384);
    for (const seating of [1, 1, 2]) await store(technician, chip.chipId, "before", image, seating);
    expect(await stateOf(technician, chip.chipId)).toBe("held");
    expect((await readsOf(technician, chip.chipId, "before"))[0].findings).toMatchObject([{ code: "extra-bytes", severity: "blocks" }]);
    await correctChip(technician, chip.chipId, { changes: { sizeBytes: 16_384 }, reason: "The marking says 128 Kbit." });
    expect(await stateOf(technician, chip.chipId)).toBe("ready");
    expect((await readsOf(technician, chip.chipId, "before"))[0].findings).toEqual([]);
    expect((await logOf(chip.driveId)).slice(-3).map((e) => e.action)).toEqual(["read.judged", "read.judged", "read.judged"]);
  });

  it("to another chip's designator on the same board is refused", async () => {
    const technician = await makeUser("technician");
    const chip = await makeChip(technician);
    const other = await recordChip(technician, chip.originalBoardId, { ...CHIP, designator: "U20" });
    expect(await refusalOf(correctChip(technician, other.id, { changes: { designator: "U12" }, reason: "Misread." }))).toMatchObject({ code: "rule-against" });
    expect(await refusalOf(recordChip(technician, chip.originalBoardId, { ...CHIP, designator: "U20" }))).toEqual({ code: "rule-against", detail: expect.stringMatching(/^This board has a U20 already\./) });
  });
});
