import { closeCase } from "@/lib/commands/close-case";
import { receiveParcel } from "@/lib/commands/receive-parcel";
import { recordBoard } from "@/lib/commands/record-board";
import { recordChip } from "@/lib/commands/record-chip";
import { recordDrive } from "@/lib/commands/record-drive";
import { recordShelfBoard } from "@/lib/commands/record-shelf-board";
import { recordStartUp } from "@/lib/commands/record-start-up";
import { returnCase } from "@/lib/commands/return-case";
import { takeFromShelf } from "@/lib/commands/take-from-shelf";
import { expectedItems } from "@/lib/queries/closing";
import { Chip } from "@/models";
import { clear, FIRMWARE_CHIP, move, type Pair, readBack, readOriginal, saveDonor, SETTINGS_CHIP, write } from "./bench-work";
import { BOARDS, labelled } from "./cases";
import { firmware, settings } from "./images";
import type { Staff } from "./people";
import { boardPhoto, labelPhoto } from "./photos";
import { ask, photograph } from "./requests";
import { known, SHELF_FIRMWARE, SHELF_SETTINGS } from "./shelf";

const KIND = "PN 4471-0093-B";
const SERIAL = "9KQ3-75D0-A4";

/** A whole job, from the public form to the closed case: two chips, one moved and one written. Answers the case. */
export async function makeReturned({ pell, mira, ines, bram }: Staff): Promise<string> {
  const made = await ask({
    name: "Jory Kemble", email: "jory.kemble@kemble.example", phone: "01632 960 121", returnAddress: "Loft 4, Old Tannery\nFennick ZZ2 7HB", partNumber: KIND, serial: SERIAL, capacity: "2 TB",
    boardNumber: "BX 40-3179", boardRevision: "rev C", enclosure: "none", lock: "none", damage: "wrong-supply", happened: "A 19 V adapter was plugged into the dock.", importance: "matters",
  });
  await receiveParcel(pell, made.id, { carrier: "Fennick Parcels", tracking: "FP 2207 8790 55", sealAsSent: "yes", sealNumber: "S-4402", smallBoard: "none", parcelCondition: "Sound; drive in an antistatic bag", accessories: null });
  const { id: driveId } = await recordDrive(mira, made.id, { ...labelled(KIND, SERIAL), capacity: "2 TB", encryption: "none" });
  const { id: original } = await recordBoard(mira, driveId, { role: "original", ...BOARDS[KIND], condition: "Input diode shorted" });
  await photograph(pell, "drive", driveId, { fileName: "label.jpg", caption: "Label", picture: await labelPhoto({ partNumber: KIND, serial: SERIAL }) });
  await photograph(pell, "board", original, { fileName: "board-top.jpg", caption: "Top, as it came", picture: await boardPhoto({ ...BOARDS[KIND], designators: ["U3", "U12"] }) });
  const u3 = await recordChip(mira, original, { designator: "U3", ...FIRMWARE_CHIP });
  const u12 = await recordChip(mira, original, { designator: "U12", ...SETTINGS_CHIP });
  const shelf = await recordShelfBoard(mira, known(KIND, { chips: [SHELF_FIRMWARE, SHELF_SETTINGS], origin: "Lot of twelve, spring sale", condition: "Clean; connector straight", place: "Cabinet 2, drawer 4" }));
  const { boardId } = await takeFromShelf(mira, shelf.id, { driveId });
  const pairOf = async (chip: string, designator: string): Promise<Pair> =>
    ({ chip, donorChip: (await Chip.findOne({ where: { boardId, designator } }))!.id, name: `${made.ref}_A_${designator}` });
  const of = (unit: string) => ({ kind: KIND, unit });
  for (const [at, image, own, put] of [
    [await pairOf(u3.id, "U3"), firmware(of(SERIAL)), firmware(of(`donor for ${SERIAL}`)), move],
    [await pairOf(u12.id, "U12"), settings(of(SERIAL)), settings(of(`donor for ${SERIAL}`)), write],
  ] as const) {
    await saveDonor(mira, at, own);
    const [read] = await readOriginal(mira, at, image);
    await put(mira, at, await clear(mira, ines, at, read));
    await readBack(mira, at, image);
  }
  await recordStartUp(mira, driveId, { spins: true, ready: true, reportedSerial: SERIAL, attempts: 1, note: "Ready after 9 seconds; read its first and last sectors." });
  await returnCase(pell, made.id, { items: await expectedItems(made.id), toPerson: "Jory Kemble", carrier: "Fennick Parcels", tracking: "FP 2207 8871 40", sealNumber: "S-4421" });
  await closeCase(bram, made.id, { kind: "returned" });
  return made.id;
}
