import { beforeAll, describe, expect, it } from "vitest";
import { correctBoard } from "@/lib/commands/correct-board";
import { correctChip } from "@/lib/commands/correct-chip";
import { correctDrive } from "@/lib/commands/correct-drive";
import { createCase } from "@/lib/commands/create-case";
import { recordBoard } from "@/lib/commands/record-board";
import { recordChip } from "@/lib/commands/record-chip";
import { recordDrive } from "@/lib/commands/record-drive";
import type { Actor } from "@/lib/core/words";
import { caseView } from "@/lib/queries/cases";
import { chipView } from "@/lib/queries/chip-view";
import { askedDrive, driveView, warningsWhileTyping } from "@/lib/queries/drives";
import { boardInput } from "@/lib/schemas/board";
import { chipCorrection } from "@/lib/schemas/chip";
import { driveInput } from "@/lib/schemas/drive";
import { Case, Chip, Request } from "@/models";
import { approve, freshImage, lastEntry, logOf, makeChip, makeReady, makeUser, refusalOf, sha256 } from "../support/factory";

const CHIP = { bus: "spi", sizeBytes: 8192, sizeSource: "marking", supplyMillivolts: 3300, needsTransfer: true } as const;
let technician: Actor;
let lead: Actor;
beforeAll(async () => {
  technician = await makeUser("technician");
  lead = await makeUser("lead");
});

async function newCase(name = "Oakhanger Press"): Promise<{ id: string; ref: string }> {
  return createCase(technician, { customer: { name, email: "post@oakhanger.example" }, damage: "Water" });
}
const code = (await_: Promise<unknown>) => refusalOf(await_).then((one) => one.code);

describe("a drive's label", () => {
  it("is kept whole, in the row, on the page and in the log; a correction names what stood there", async () => {
    const made = await newCase();
    const input = driveInput.parse({ partNumber: "PN 1", serial: "S-1", interface: "SATA", capacity: "2 TB", made: "2019-04", firmware: "FW 0.7", encryption: "suspected" });
    const { id } = await recordDrive(technician, made.id, input);
    expect(await lastEntry(id, "drive.recorded")).toMatchObject({ capacity: "2 TB", made: "2019-04", firmware: "FW 0.7", encryption: "suspected" });
    expect(await driveView(technician, id)).toMatchObject({ capacity: "2 TB", made: "2019-04", firmware: "FW 0.7", encryption: "suspected" });
    await correctDrive(technician, id, { changes: { encryption: "yes", capacity: null }, reason: "The enclosure's own label says so." });
    expect(await lastEntry(id, "drive.corrected")).toMatchObject({ changes: [{ field: "encryption", from: "suspected", to: "yes" }, { field: "capacity", from: "2 TB", to: null }] });
    expect((await caseView(technician, made.id)).drives[0]).toMatchObject({ encryption: "yes", capacity: null });
  });

  it("takes no fourth answer on encryption, and an empty one as not said", () => {
    expect(driveInput.safeParse({ partNumber: "PN 1", encryption: "maybe" }).success).toBe(false);
    expect(driveInput.parse({ partNumber: "PN 1", encryption: "" }).encryption).toBeNull();
  });

  it("warns of its serial in another case, while it is typed and after; a limited auditor doesn't learn of that case", async () => {
    const serial = `Dup 0-${Date.now().toString(36)}`;
    const [first, second] = [await newCase("Lindmoor Veterinary Practice"), await newCase()];
    await recordDrive(technician, first.id, { partNumber: "PN 1", serial });
    const look = await warningsWhileTyping(technician, second.id, { partNumber: "PN 2", serial: serial.toLowerCase().replace(" ", "") });
    expect(look.warnings).toMatchObject([{ code: "serial-elsewhere", cases: [{ ref: first.ref }] }]);
    expect(JSON.stringify(look)).not.toContain("Lindmoor");
    const { id } = await recordDrive(technician, second.id, { partNumber: "PN 2", serial });
    expect((await driveView(technician, id)).warnings).toMatchObject([{ code: "serial-elsewhere", cases: [{ id: first.id, ref: first.ref }] }]);
    const auditor = { ...(await makeUser("auditor")), cases: [second.id] };
    expect((await driveView(auditor, id)).warnings).toEqual([]);
    expect((await caseView(auditor, second.id)).drives[0].warnings).toEqual([]);
    expect(JSON.stringify(await caseView(auditor, second.id))).not.toContain(first.ref);
    expect(await code(warningsWhileTyping(auditor, second.id, { serial }))).toBe("forbidden");
    // the drive that is being corrected is no duplicate of itself
    expect((await warningsWhileTyping(technician, second.id, { serial, partNumber: "PN 2", except: id })).warnings.map((one) => one.code)).toEqual(["serial-elsewhere"]);
  });

  it("warns of the same drive recorded twice, and hints at look-alikes; all of it may be recorded", async () => {
    const stamp = Date.now().toString(36);
    const made = await newCase();
    await recordDrive(technician, made.id, { partNumber: "PN 1", serial: `W0${stamp}B` });
    const again = await recordDrive(technician, made.id, { partNumber: "pn1", serial: `w0${stamp}b` });
    expect((await driveView(technician, again.id)).warnings.map((one) => one.code)).toEqual(["same-drive-here"]);
    const alike = await recordDrive(technician, (await newCase()).id, { serial: `WO${stamp}8` });
    expect((await driveView(technician, alike.id)).warnings.map((one) => [one.code, one.kind])).toEqual([["serial-looks-alike", "note"]]);
  });

  it("is proposed from what the customer asked for", async () => {
    const made = await newCase();
    expect(await askedDrive(technician, made.id)).toEqual({});
    const day = new Date();
    await Request.create({ id: crypto.randomUUID(), caseId: made.id, tokenHash: Buffer.from(sha256(Buffer.from(made.id)), "hex"), answers: JSON.stringify({ partNumber: "PN 7", serial: "S-7", lock: "lost" }), addressDigest: Buffer.alloc(32), requestedAt: day, expiresAt: day });
    expect(await askedDrive(technician, made.id)).toEqual({ partNumber: "PN 7", serial: "S-7", encryption: "suspected" });
  });
});

describe("a board without a chip to move", () => {
  async function withDrive(): Promise<string> {
    return (await recordDrive(technician, (await newCase()).id, { partNumber: "PN 1" })).id;
  }

  it("takes no chip that needs a transfer and no donor, but one kept for reference", async () => {
    const drive = await withDrive();
    const { id } = await recordBoard(technician, drive, boardInput.parse({ role: "original", boardNumber: "BX 1", dataInController: true }));
    expect(await lastEntry(drive, "board.recorded")).toMatchObject({ dataInController: true });
    expect((await driveView(technician, drive)).boards[0].dataInController).toBe(true);
    expect(await code(recordChip(technician, id, { ...CHIP, designator: "U1" }))).toBe("rule-against");
    const kept = await recordChip(technician, id, { ...CHIP, designator: "U1", needsTransfer: false });
    expect(await code(correctChip(technician, kept.id, { changes: { needsTransfer: true }, reason: "By mistake." }))).toBe("rule-against");
    expect(await code(recordBoard(lead, drive, { role: "donor", boardNumber: "BX 1" }))).toBe("rule-against");
    await correctBoard(technician, id, { changes: { dataInController: false }, reason: "There is a chip under the shield." });
    await correctChip(technician, kept.id, { changes: { needsTransfer: true }, reason: "It holds the data." });
    expect(await lastEntry(drive, "board.corrected")).toMatchObject({ changes: [{ field: "dataInController", from: true, to: false }] });
  });

  it("can't be said of a board whose chip needs a transfer, nor of a donor", async () => {
    const at = await makeChip(technician);
    const said = { changes: { dataInController: true }, reason: "Nothing outside." };
    expect(await refusalOf(correctBoard(technician, at.originalBoardId, said))).toMatchObject({ code: "rule-against", detail: expect.stringContaining("U12 of this board needs a transfer") as string });
    expect(await code(correctBoard(technician, at.donorBoardId, said))).toBe("does-not-fit");
    expect(await code(recordBoard(technician, at.driveId, { role: "donor", boardNumber: "BX 40-3179", dataInController: true }))).toBe("does-not-fit");
    expect(await lastEntry(at.driveId, "board.corrected")).toBeUndefined();
  });
});

describe("two chips of one board", () => {
  it("name each other on their pages, on the donor's too, and in the approval's entry", async () => {
    const at = await makeChip(technician);
    expect((await chipView(technician, at.chipId)).siblings).toEqual([]);
    const second = await recordChip(technician, at.originalBoardId, { ...CHIP, designator: "U14" });
    await recordChip(technician, at.originalBoardId, { ...CHIP, designator: "U1", needsTransfer: false });
    const named = [{ id: second.id, designator: "U14", state: "unread", label: "To read", unread: true }];
    expect((await chipView(technician, at.chipId)).siblings).toEqual(named);
    expect((await chipView(technician, at.donorChipId)).siblings).toEqual(named);
    const image = freshImage();
    await makeReady(technician, at, image);
    await approve(lead, at, image);
    expect(await lastEntry(at.driveId, "approval.given")).toMatchObject({ siblings: [{ designator: "U14", state: "To read" }] });
    expect((await chipView(technician, second.id)).siblings).toMatchObject([{ designator: "U12", state: "approved", unread: false }]);
  });
});

describe("a chip's place on the picture", () => {
  it("is a correction with from and to, both numbers at once, and judges no read again", async () => {
    const at = await makeChip(technician);
    await makeReady(technician, at, freshImage());
    const judged = async () => (await logOf(at.driveId)).filter((entry) => entry.action === "read.judged").length;
    const before = await judged();
    const input = chipCorrection.parse({ changes: { placeX: 410, placeY: 205 }, reason: "Placed on the picture" });
    await correctChip(technician, at.chipId, input);
    expect(await lastEntry(at.driveId, "chip.corrected")).toMatchObject({ changes: [{ field: "placeX", from: null, to: 410 }, { field: "placeY", from: null, to: 205 }], reason: "Placed on the picture" });
    expect((await driveView(technician, at.driveId)).boards[0].chips[0].place).toEqual({ x: 410, y: 205 });
    expect(await judged()).toBe(before);
    await correctChip(technician, at.chipId, chipCorrection.parse({ changes: { placeX: null, placeY: null }, reason: "Wrong picture" }));
    expect((await Chip.findByPk(at.chipId))!.placeX).toBeNull();
  });

  it("lies on the picture or nowhere", () => {
    for (const changes of [{ placeX: 1001, placeY: 0 }, { placeX: -1, placeY: 0 }, { placeX: 1.5, placeY: 0 }, { placeX: 3 }, { placeX: 3, placeY: null }, { placeX: "3", placeY: "4" }]) {
      expect(chipCorrection.safeParse({ changes, reason: "Placed on the picture" }).success, JSON.stringify(changes)).toBe(false);
    }
  });
});

it("leaves a closed case as it is, and says to reopen it", async () => {
  const at = await makeChip(technician);
  await Case.update({ closedAt: new Date() }, { where: { id: at.caseId } });
  const reason = "Tried after the end.";
  const before = (await logOf(at.driveId)).length;
  for (const tried of [
    () => recordDrive(technician, at.caseId, { partNumber: "PN 1" }), () => recordBoard(technician, at.driveId, { role: "donor", boardNumber: "BX 40-3179" }), () => recordChip(technician, at.originalBoardId, { ...CHIP, designator: "U9" }),
    () => correctDrive(technician, at.driveId, { changes: { model: "M" }, reason }), () => correctBoard(technician, at.originalBoardId, { changes: { revision: "rev D" }, reason }), () => correctChip(technician, at.chipId, { changes: { package: "SOIC-8" }, reason }),
  ]) expect(await refusalOf(tried())).toMatchObject({ code: "rule-against", detail: expect.stringContaining("Reopen it first") as string });
  expect((await logOf(at.driveId)).length).toBe(before);
});
