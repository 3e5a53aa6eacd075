import { changeShelfBoard } from "@/lib/commands/change-shelf-board";
import { recordShelfBoard } from "@/lib/commands/record-shelf-board";
import { type ShelfInput, shelfInput } from "@/lib/schemas/shelf";
import { Case, Drive } from "@/models";
import { BOARDS } from "./cases";
import type { Staff } from "./people";

export const SHELF_FIRMWARE = { designator: "U3", bus: "spi", sizeBytes: 524_288, package: "SOIC-8", marking: "A7 0442 K" } as const;
export const SHELF_SETTINGS = { designator: "U12", bus: "i2c", sizeBytes: 8192, package: "TSSOP-8", marking: "64C 118" } as const;

export const known = (part: keyof typeof BOARDS, more: Partial<ShelfInput> = {}): ShelfInput => shelfInput.parse({ ...BOARDS[part], ...more });

/** The donor shelf: boards that fit the demo's drives, with all that a shelf has of doubt. */
export async function makeShelf({ mira, tomas, ines }: Staff): Promise<void> {
  const drive = await Drive.findOne({ where: { partNumber: "PN 5108-0210-C" }, order: [["createdAt", "DESC"]] });
  const waiting = drive && (await Case.findByPk(drive.caseId));
  const put = (input: ShelfInput) => recordShelfBoard(tomas, input);
  await put(known("PN 4471-0093-B", { chips: [SHELF_FIRMWARE, SHELF_SETTINGS], origin: "Lot of twelve, spring sale", condition: "Clean; connector straight", place: "Cabinet 2, drawer 4" }));
  await put(known("PN 4471-0093-B", { revision: "rev D", chips: [SHELF_FIRMWARE, SHELF_SETTINGS], origin: "Lot of twelve, spring sale", condition: "One scratch beside the motor driver, traces whole", place: "Cabinet 2, drawer 4" }));
  await put(known("PN 4471-0093-B", { revision: null, motorDriverMarking: null, origin: "Taken off a drive with damaged platters", condition: "Label residue over the motor driver", place: "Cabinet 2, drawer 5", note: "Read the motor driver's marking before it is taken." }));
  await put(known("PN 2214-0066-A", { chips: [SHELF_SETTINGS], origin: "Bought singly", condition: "As new, sealed bag", place: "Cabinet 1, drawer 2" }));
  await put(known("PN 5108-0210-C", { chips: [SHELF_FIRMWARE], origin: "Returned with thanks by a customer", condition: "Clean", place: "Cabinet 3, drawer 1", reservedFor: waiting?.ref ?? null }));
  await put(known("PN 5108-0210-C", { revision: "rev C", controllerMarking: "KV-9121", chips: [SHELF_FIRMWARE], origin: "Lot of twelve, spring sale", place: "Cabinet 3, drawer 1" }));
  await recordShelfBoard(mira, known("PN 3320-0071-A", { chips: [{ ...SHELF_FIRMWARE, designator: "U2", marking: null }], origin: "Bought singly", condition: "Two pads of the heads' connector worn", place: "Cabinet 1, drawer 6" }));
  const worn = await recordShelfBoard(mira, known("PN 3320-0071-A", { origin: "Taken off a drive with damaged platters", condition: "Corroded under the connector", place: "Box of parts" }));
  await changeShelfBoard(ines, worn.id, { changes: { retired: true }, reason: "Corrosion has reached the motor driver; kept for parts only." });
}
