import { addNote } from "@/lib/commands/add-note";
import { confirmHandOver } from "@/lib/commands/confirm-hand-over";
import { correctCase } from "@/lib/commands/correct-case";
import { correctChip } from "@/lib/commands/correct-chip";
import { handOverItem } from "@/lib/commands/hand-over-item";
import { holdCase } from "@/lib/commands/hold-case";
import { receiveParcel } from "@/lib/commands/receive-parcel";
import { recordBoard } from "@/lib/commands/record-board";
import { recordChip } from "@/lib/commands/record-chip";
import { recordDrive } from "@/lib/commands/record-drive";
import { recordShelfBoard } from "@/lib/commands/record-shelf-board";
import { takeFromShelf } from "@/lib/commands/take-from-shelf";
import type { ItemType } from "@/lib/core/words";
import { FIRMWARE_CHIP } from "./bench-work";
import { BOARDS, day, labelled, receiveCase, type ShownCase } from "./cases";
import type { Staff } from "./people";
import { boardPhoto, labelPhoto, PLACES } from "./photos";
import { ask, photograph } from "./requests";
import { known, SHELF_FIRMWARE } from "./shelf";

/** What a workshop does around the chips: requests, parcels, photos, notes, hand-overs, holds. */
export async function makeAround(staff: Staff, shown: ShownCase): Promise<void> {
  await photosAndPlaces(staff, shown);
  await notes(staff, shown);
  await handOvers(staff, shown);
  await noChipToMove(staff);
  await encryptedEnclosure(staff);
  await waitsForParcel();
}

async function photosAndPlaces({ mira }: Staff, { boards: { driveId, original }, u3, u12 }: ShownCase): Promise<void> {
  const facts = BOARDS["PN 4471-0093-B"];
  await photograph(mira, "drive", driveId, { fileName: "label.jpg", caption: "Label", picture: await labelPhoto({ partNumber: "PN 4471-0093-B", serial: "9KQ3-70B8-D2" }) });
  await photograph(mira, "board", original, { fileName: "board-top.jpg", caption: "Top, as it came; U2 scorched", picture: await boardPhoto({ ...facts, designators: ["U3", "U12"], scorched: true }) });
  for (const [chip, { x, y }] of [[u3.chip, PLACES.U3], [u12.chip, PLACES.U12]] as const) {
    await correctChip(mira, chip, { changes: { placeX: x, placeY: y }, reason: "Placed on the board's photo" });
  }
}

async function notes({ mira, tomas }: Staff, { caseId, boards: { driveId } }: ShownCase): Promise<void> {
  await addNote(mira, caseId, { text: "U2 took the surge; its two capacitors are open. U3 and U12 measure clean against ground.", driveId });
  const yesterday = new Date(Date.now() - 26 * 3_600_000).toISOString();
  const { id } = await addNote(tomas, caseId, { text: "The customer phoned: the office was without mains for ten minutes before the surge. They need the drawings by Friday.", happenedAt: yesterday });
  await addNote(tomas, caseId, { text: "The mains were off for forty minutes, not ten. The rest stands.", corrects: id });
  await correctCase(mira, caseId, { changes: { customerPhone: "01632 960 148" }, reason: "One figure was mistyped; read back on the telephone." });
}

async function handOvers({ pell, mira, tomas }: Staff, { boards: { driveId, donor } }: ShownCase): Promise<void> {
  const give = (from: keyof typeof bench, to: keyof typeof bench, type: ItemType, id: string, condition: string, sealNumber?: string) =>
    handOverItem(bench[from].who, driveId, { item: { type, id }, from: { person: bench[from].who.name, place: bench[from].place }, to: { person: bench[to].who.name, place: bench[to].place, userId: bench[to].who.id }, condition, sealNumber });
  const bench = { pell: { who: pell, place: "Front desk" }, mira: { who: mira, place: "Bench 2" }, tomas: { who: tomas, place: "Bench 3, hot air" } };
  const { id } = await give("pell", "mira", "drive", driveId, "As received, in its bag", "S-4409");
  await confirmHandOver(mira, id, { received: true });
  await give("mira", "tomas", "board", donor, "Clean; in an antistatic box");
}

/** The unique data lies in the controller: nothing can be read or moved. */
async function noChipToMove({ pell, ines }: Staff): Promise<void> {
  const made = await receiveCase(pell, "Ferrow Print Works", "office@ferrowprint.example", "Printer and drive on one adapter; the wrong one was plugged in", 3);
  const { id } = await recordDrive(pell, made.id, { ...labelled("PN 3320-0071-A", "RK2-95-63D"), capacity: "2 TB" });
  await recordBoard(pell, id, { role: "original", ...BOARDS["PN 3320-0071-A"], revision: "rev F", dataInController: true, condition: "Clean; no separate memory chip on either side" });
  await holdCase(ines, made.id, { waitingFor: "customer", reason: "There is no chip on this board that could be moved. Should the drive go back to you as it is?" });
}

/** Came by the public form; the enclosure's small board, which may hold the key, did not come along. */
async function encryptedEnclosure({ pell, mira }: Staff): Promise<void> {
  const kind = "PN 5108-0210-C";
  const made = await ask({
    name: "Maud Tillery", email: "maud.tillery@tillery.example", phone: "01632 960 177", returnAddress: "3 Saltern Steps\nFennick ZZ3 2LH", partNumber: kind, serial: "L7-5602-71", capacity: "4 TB",
    boardHidden: "yes", enclosure: "sent", lock: "known", damage: "wrong-supply", happened: "I plugged in the laptop's adapter. A short flash, then nothing.", tried: "Another cable, once.", importance: "matters", neededBy: day(9),
  });
  await receiveParcel(pell, made.id, {
    carrier: "Fennick Parcels", tracking: "FP 2207 8841 03", sealAsSent: "yes", sealNumber: "S-4417", smallBoard: "no", parcelCondition: "Box sound, drive in an antistatic bag", accessories: "USB cable",
    lines: [{ what: "Enclosure", asSent: "none" }],
  });
  const drive = await recordDrive(mira, made.id, { ...labelled(kind, "L7-5602-71"), capacity: "4 TB", encryption: "suspected" });
  const board = await recordBoard(mira, drive.id, { role: "original", ...BOARDS[kind], condition: "Protective diode burnt" });
  await recordChip(mira, board.id, { designator: "U3", ...FIRMWARE_CHIP });
  const { id } = await recordShelfBoard(mira, known(kind, { chips: [SHELF_FIRMWARE], origin: "Lot of twelve, spring sale", condition: "Clean", place: "Cabinet 3, drawer 2" }));
  await takeFromShelf(mira, id, { driveId: drive.id });
  await holdCase(mira, made.id, { waitingFor: "customer", reason: "Do you still have the enclosure with its small board? It was not in the parcel, and it may hold the key to your data." });
}

async function waitsForParcel(): Promise<void> {
  const picture = await boardPhoto({ ...BOARDS["PN 2214-0066-A"], designators: ["U12"] });
  await ask({
    name: "Corin Ashdale", email: "corin@ashdale.example", company: "Ashdale Bookbinders", phone: "01632 960 115", returnAddress: "Ashdale Bookbinders\n8 Cooper's Row\nFennick ZZ1 4QT",
    partNumber: "PN 2214-0066-A", serial: "TT41-1310-E2", interface: "SATA", capacity: "1 TB", made: "Mar 2016", boardNumber: "BX 38-1140", boardRevision: "rev A", enclosure: "none", lock: "none",
    damage: "power-surge", happened: "Lightning struck the yard. The workshop's computer was on; the drive has not spun since.", tried: "Switched on twice more. Nobody opened it.", importance: "critical", neededBy: day(12),
  }, [{ fileName: "board.jpg", caption: "The board as it looks now", picture }]);
}
