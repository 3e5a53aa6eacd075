import { beforeAll, describe, expect, it } from "vitest";
import { changeShelfBoard } from "@/lib/commands/change-shelf-board";
import { closeCase } from "@/lib/commands/close-case";
import { createCase } from "@/lib/commands/create-case";
import { recordBoard } from "@/lib/commands/record-board";
import { recordChip } from "@/lib/commands/record-chip";
import { recordDrive } from "@/lib/commands/record-drive";
import { recordShelfBoard } from "@/lib/commands/record-shelf-board";
import { takeFromShelf } from "@/lib/commands/take-from-shelf";
import { withCheck } from "@/lib/core/case-number";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { checkCustody } from "@/lib/queries/custody";
import { driveView } from "@/lib/queries/drives";
import { boardsThatFit, shelfBoard, shelfList } from "@/lib/queries/shelf";
import { shelfInput, shelfListInput } from "@/lib/schemas/shelf";
import { Board, Chip, ShelfBoard } from "@/models";
import { freshImage, lastEntry, logOf, makeUser, refusalOf, sha256, store } from "../support/factory";
import { answerOf, makeLimited } from "../support/limited";

const CHIP = { designator: "U12", bus: "spi", sizeBytes: 8192, sizeSource: "marking", supplyMillivolts: 3300, needsTransfer: true } as const;
const UNKNOWN = "0badc0de-0000-4000-8000-00000badc0de";
let technician: Actor;
let lead: Actor;
let turn = 0;
beforeAll(async () => {
  technician = await makeUser("technician");
  lead = await makeUser("lead");
});

/** A board number that no other test has. */
const freshNumber = () => `BX ${Date.now().toString(36)}-${(turn += 1)}`;
async function newDrive(boardNumber: string, facts: { revision?: string; controllerMarking?: string } = {}) {
  const made = await createCase(technician, { customer: { name: "Oakhanger Press", email: "post@oakhanger.example" }, damage: "Water" });
  const drive = await recordDrive(technician, made.id, { partNumber: "PN 1" });
  const original = await recordBoard(technician, drive.id, { role: "original", boardNumber, ...facts });
  const chip = await recordChip(technician, original.id, CHIP);
  return { caseId: made.id, ref: made.ref, driveId: drive.id, originalId: original.id, chipId: chip.id };
}
const put = (input: Record<string, unknown>, actor = technician) => recordShelfBoard(actor, shelfInput.parse(input));
const list = (actor: Actor, query: Record<string, unknown>) => shelfList(actor, shelfListInput.parse(query));

describe("the shelf", () => {
  it("gives out numbers that count up, also to two at once, and writes each into the workshop's log", async () => {
    const boardNumber = freshNumber();
    const made = await Promise.all(Array.from({ length: 6 }, () => put({ boardNumber, revision: "rev C", origin: "Bought in a lot", place: "Drawer 4" })));
    const numbers = made.map(({ number }) => Number(number.slice(2))).sort((a, b) => a - b);
    expect(new Set(numbers).size).toBe(6);
    expect(numbers[5] - numbers[0]).toBe(5);
    const told = (await logOf(WORKSHOP_CHAIN)).filter((entry) => entry.action === "shelf.recorded" && entry.facts.boardNumber === boardNumber);
    expect(told.map((entry) => entry.facts.number).sort()).toEqual(made.map(({ number }) => number).sort());
  });

  it("is searched, filtered, sorted and paged by the database", async () => {
    const boardNumber = freshNumber();
    const [a, b, c] = [await put({ boardNumber, place: "Z 100%_", chips: [{ designator: "u7", bus: "i2c", sizeBytes: 8192, marking: "64C 118" }] }), await put({ boardNumber, place: "A 1" }), await put({ boardNumber, place: "M 1" })];
    expect((await list(technician, { q: boardNumber, sort: "place", order: "asc", pageSize: 2 })).items.map((row) => row.number)).toEqual([b.number, c.number]);
    expect((await list(technician, { q: boardNumber, sort: "place", order: "asc", pageSize: 2, page: 2 })).items.map((row) => row.number)).toEqual([a.number]);
    expect((await list(technician, { q: "100%_" })).items.map((row) => row.number)).toContain(a.number);
    expect((await list(technician, { q: a.number.toLowerCase().replace("-", " ") })).items).toMatchObject([{ number: a.number, chips: [{ designator: "U7", bus: "i2c", sizeBytes: 8192, package: null, marking: "64C 118" }] }]);
    await changeShelfBoard(lead, c.id, { changes: { retired: true }, reason: "Bent connector." });
    expect((await list(technician, { q: boardNumber, state: "retired" })).items).toMatchObject([{ number: c.number, state: "retired", retired: { reason: "Bent connector." } }]);
    expect((await list(technician, { q: boardNumber, state: "on-shelf" })).total).toBe(2);
  });

  it("corrects facts with a reason, moves a board without one, and says nothing twice", async () => {
    const { id } = await put({ boardNumber: freshNumber(), revision: "rev B", place: "Drawer 1" });
    await changeShelfBoard(technician, id, { changes: { place: "Drawer 2" } });
    expect(await lastEntry(WORKSHOP_CHAIN, "shelf.changed")).toMatchObject({ shelfBoard: id, changes: [{ field: "place", from: "Drawer 1", to: "Drawer 2" }], reason: null });
    expect(await refusalOf(changeShelfBoard(technician, id, { changes: { revision: "rev C" } }))).toMatchObject({ code: "does-not-fit", detail: "Give a reason for the correction." });
    await changeShelfBoard(technician, id, { changes: { revision: "rev C", chips: [{ designator: "U3", bus: "spi", sizeBytes: 524_288, package: null, marking: null }] }, reason: "Misread." });
    expect(await lastEntry(WORKSHOP_CHAIN, "shelf.changed")).toMatchObject({ changes: [{ field: "revision", from: "rev B", to: "rev C" }, { field: "chips", from: null, to: "U3,spi,524288" }], reason: "Misread." });
    expect(await refusalOf(changeShelfBoard(technician, id, { changes: { revision: "rev C" }, reason: "Again." }))).toMatchObject({ code: "does-not-fit" });
    expect((await shelfBoard(technician, id)).history.map((entry) => entry.sentence)).toHaveLength(3);
  });

  it("keeps a board for a case by its number, with its check character too, and for no closed one", async () => {
    const { ref, caseId } = await newDrive(freshNumber());
    const { id } = await put({ boardNumber: freshNumber(), reservedFor: withCheck(ref) });
    expect(await shelfBoard(technician, id)).toMatchObject({ state: "reserved", reservedFor: { caseId, ref } });
    expect((await list(technician, { q: ref })).items).toMatchObject([{ id }]);
    await changeShelfBoard(technician, id, { changes: { reservedFor: null } });
    await closeCase(lead, caseId, { kind: "cancelled", reason: "The customer withdrew." });
    expect((await refusalOf(changeShelfBoard(technician, id, { changes: { reservedFor: ref } }))).detail).toMatch(/is closed/);
    expect((await refusalOf(changeShelfBoard(technician, id, { changes: { reservedFor: "drawer" } }))).detail).toMatch(/no case number/);
  });

  it("is the workshop's: an auditor with a case list finds nothing there, word for word like an address that never was; other auditors only look", async () => {
    const drive = await newDrive(freshNumber());
    const { id } = await put({ boardNumber: freshNumber() });
    const limited = await makeLimited([drive.caseId]);
    for (const run of [() => list(limited, {}), () => shelfBoard(limited, id), () => boardsThatFit(limited, drive.driveId), () => changeShelfBoard(limited, id, { changes: { place: "x" } }), () => takeFromShelf(limited, id, { driveId: drive.driveId })]) {
      expect(await answerOf(run)).toMatchObject({ status: 404, detail: "The interface has no such address. Check its spelling and the id in it." });
    }
    const auditor = await makeUser("auditor");
    expect((await list(auditor, {})).total).toBeGreaterThan(0);
    expect(await refusalOf(put({ boardNumber: "BX 1" }, auditor))).toMatchObject({ code: "forbidden" });
    expect(await refusalOf(shelfBoard(technician, UNKNOWN))).toMatchObject({ code: "not-found" });
  });
});

describe("boards that fit a drive", () => {
  it("are those with its board number however it was typed, best first, every difference said and nothing hidden", async () => {
    const boardNumber = freshNumber();
    const { driveId, ref } = await newDrive(boardNumber, { revision: "rev C", controllerMarking: "KV-8810" });
    const other = await newDrive(freshNumber());
    const chips = [{ designator: "U12", bus: "spi", sizeBytes: 8192 }];
    const elsewhere = await put({ boardNumber, revision: "rev C", controllerMarking: "KV-8810", chips, reservedFor: other.ref });
    const rev = await put({ boardNumber, revision: "rev D", controllerMarking: "KV-8810", chips });
    const unknown = await put({ boardNumber: boardNumber.replace(" ", "").toLowerCase(), controllerMarking: "KV-8810" });
    const smaller = await put({ boardNumber: ` ${boardNumber.replace("-", " - ")}`, revision: "rev C", controllerMarking: "KV-8811", chips: [{ designator: "U12", bus: "spi", sizeBytes: 4096 }] });
    const best = await put({ boardNumber, revision: "rev C", controllerMarking: "kv-8810", chips });
    await put({ boardNumber: `${boardNumber}9`, revision: "rev C" });
    const gone = await put({ boardNumber, revision: "rev C" });
    await changeShelfBoard(lead, gone.id, { changes: { retired: true }, reason: "Cracked." });
    const { boards } = await boardsThatFit(technician, driveId);
    expect(boards.map((board) => board.name)).toEqual([best, unknown, rev, smaller, elsewhere].map((one) => one.number));
    expect(boards[0].fit).toEqual({ verdict: "fits", differences: [], unknown: [] });
    expect(boards[1].fit).toEqual({ verdict: "fits", differences: [], unknown: ["Its revision is not on record.", "Its chips are not on record, so U12 is not compared."] });
    expect(boards[2].fit).toEqual({ verdict: "caution", differences: ["Another revision: rev D; the original has rev C."], unknown: [] });
    expect(boards[3].fit).toMatchObject({ verdict: "caution", differences: ["Another controller marking: KV-8811; the original has KV-8810.", "Its U12 has 4,096 bytes; the original’s has 8,192."] });
    expect(boards[4]).toMatchObject({ reserved: "elsewhere", reservedRef: other.ref });
    await changeShelfBoard(technician, rev.id, { changes: { reservedFor: ref } });
    expect((await boardsThatFit(technician, driveId)).boards.find((board) => board.id === rev.id)).toMatchObject({ reserved: "here" });
  });
});

describe("taking a board", () => {
  it("makes it the drive's donor with its chips in one go: row, both logs, the pair; what is not known of a chip is left", async () => {
    const boardNumber = freshNumber();
    const { driveId, chipId, ref, originalId } = await newDrive(boardNumber, { revision: "rev C" });
    const made = await put({ boardNumber, revision: "rev D", condition: "Sound", reservedFor: ref, chips: [{ designator: "U12", bus: "spi", sizeBytes: 8192, marking: "A7" }, { designator: "U9", bus: "i2c" }] });
    const taken = await takeFromShelf(technician, made.id, { driveId });
    expect(taken).toMatchObject({ fit: { verdict: "caution" }, chips: ["U12"], left: ["U9"] });
    const donor = (await driveView(technician, driveId)).boards.find((board) => board.role === "donor");
    expect(donor).toMatchObject({ id: taken.boardId, boardNumber, revision: "rev D", condition: "Sound", chips: [{ designator: "U12", marking: "A7", pair: { designator: "U12" } }] });
    expect((await Chip.findOne({ where: { boardId: taken.boardId } }))!.pairedWithId).toBe(chipId);
    expect((await logOf(driveId)).map((entry) => entry.action).slice(-4)).toEqual(["board.recorded", "board.taken-from-shelf", "chip.recorded", "chip.paired"]);
    expect(await lastEntry(WORKSHOP_CHAIN, "shelf.changed")).toMatchObject({ number: made.number, changes: [{ field: "taken for", from: null, to: `Drive A of case ${ref}` }, { field: "reserved for", from: ref, to: null }] });
    expect(await shelfBoard(technician, made.id)).toMatchObject({ state: "taken", taken: { driveId, letter: "A", ref } });
    expect((await checkCustody(driveId)).findings).toEqual([]);
    expect((await refusalOf(changeShelfBoard(technician, made.id, { changes: { place: "back" } }))).detail).toBe(`${made.number} was taken for Drive A of case ${ref}. Correct the donor board on that drive's page.`);
    expect(await Board.count({ where: { driveId } })).toBe(2);
    expect(originalId).not.toBe(taken.boardId);
  });

  it("happens once, also when eight try at the same moment", async () => {
    const boardNumber = freshNumber();
    const drives = [];
    for (let i = 0; i < 8; i += 1) drives.push(await newDrive(boardNumber));
    const made = await put({ boardNumber, chips: [{ designator: "U12", bus: "spi", sizeBytes: 8192 }] });
    const ends = await Promise.allSettled(drives.map(({ driveId }) => takeFromShelf(technician, made.id, { driveId })));
    const refusals = ends.flatMap((end) => (end.status === "rejected" ? [end.reason as { code: string; detail: string }] : []));
    expect(refusals.map((one) => one.code)).toEqual(Array(7).fill("rule-against"));
    expect(refusals[0].detail).toMatch(/^D-\d{4} was taken for Drive A of case .*Take another board\.$/);
    expect(await Board.count({ where: { driveId: drives.map((one) => one.driveId), role: "donor" } })).toBe(1);
    const row = await ShelfBoard.findByPk(made.id);
    const second = await put({ boardNumber });
    await expect(ShelfBoard.update({ takenBoardId: row!.takenBoardId }, { where: { id: second.id } })).rejects.toThrow();
  });

  it("is refused for a board that is reserved for another case, retired, or whose drive's case is closed; nothing is left behind", async () => {
    const boardNumber = freshNumber();
    const [mine, other] = [await newDrive(boardNumber), await newDrive(boardNumber)];
    const kept = await put({ boardNumber, reservedFor: other.ref });
    expect(await refusalOf(takeFromShelf(technician, kept.id, { driveId: mine.driveId }))).toEqual(expect.objectContaining({ code: "rule-against", detail: `${kept.number} is reserved for case ${other.ref}. Take another board, or have the reservation taken off on its page.` }));
    await changeShelfBoard(lead, kept.id, { changes: { retired: true }, reason: "Corroded." });
    expect((await refusalOf(takeFromShelf(technician, kept.id, { driveId: other.driveId }))).detail).toMatch(/is retired: Corroded\./);
    expect(await lastEntry(WORKSHOP_CHAIN, "shelf.changed")).toMatchObject({ changes: [{ field: "reserved for", from: other.ref, to: null }, { field: "retired", from: false, to: true }] });
    await changeShelfBoard(lead, kept.id, { changes: { retired: false }, reason: "It was the other one." });
    await closeCase(lead, mine.caseId, { kind: "cancelled", reason: "Withdrawn." });
    expect((await refusalOf(takeFromShelf(technician, kept.id, { driveId: mine.driveId }))).detail).toMatch(/is closed\. Reopen it first/);
    expect(await shelfBoard(technician, kept.id)).toMatchObject({ state: "on-shelf" });
    expect(await Board.count({ where: { driveId: mine.driveId, role: "donor" } })).toBe(0);
  });

  it("of another board number needs a lead and a reason, as any donor does", async () => {
    const { driveId } = await newDrive(freshNumber());
    const made = await put({ boardNumber: freshNumber() });
    expect(await refusalOf(takeFromShelf(technician, made.id, { driveId, reason: "I think so." }))).toMatchObject({ code: "rule-against" });
    expect(await refusalOf(takeFromShelf(lead, made.id, { driveId }))).toMatchObject({ code: "does-not-fit" });
    expect(await takeFromShelf(lead, made.id, { driveId, reason: "Same layout, relabelled." })).toMatchObject({ fit: { verdict: "other-number" } });
  });

  it("leaves what was saved from it findable: on its page, and by the first digits of the digest", async () => {
    const boardNumber = freshNumber();
    const { driveId } = await newDrive(boardNumber);
    const made = await put({ boardNumber, chips: [{ designator: "U12", bus: "spi", sizeBytes: 8192 }] });
    const { boardId } = await takeFromShelf(technician, made.id, { driveId });
    const chip = (await Chip.findOne({ where: { boardId } }))!;
    const image = freshImage();
    for (const seating of [1, 1]) await store(technician, chip.id, "donor", image, seating);
    expect((await shelfBoard(technician, made.id)).saved).toMatchObject([
      { name: "Own 1", chipId: chip.id, designator: "U12", sizeBytes: 8192, sha256: sha256(image), counted: true }, { name: "Own 2", sha256: sha256(image) },
    ]);
    expect((await list(technician, { q: sha256(image).slice(0, 8) })).items.map((row) => row.id)).toEqual([made.id]);
    expect((await list(technician, { q: sha256(image).toUpperCase() })).total).toBe(1);
  });
});
