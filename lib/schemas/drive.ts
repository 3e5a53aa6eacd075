import { z } from "zod";
import { ENCRYPTIONS } from "@/lib/core/words";
import { line, maybe, reason, uuid } from "./text";

const facts = {
  partNumber: maybe(line(120, "a part number")),
  model: maybe(line(120, "a model")),
  serial: maybe(line(120, "a serial number")),
  interface: maybe(line(60, "an interface")),
  capacity: maybe(line(40, "a capacity")),
  made: maybe(line(40, "when or where it was made")),
  firmware: maybe(line(60, "a firmware revision")),
  encryption: maybe(z.enum(ENCRYPTIONS, "Choose whether the drive is encrypted.")),
};
const NAMED = "Give at least one of part number, model and serial number.";

export const driveInput = z.strictObject({
  partNumber: facts.partNumber.optional(), model: facts.model.optional(), serial: facts.serial.optional(), interface: facts.interface.optional(),
  capacity: facts.capacity.optional(), made: facts.made.optional(), firmware: facts.firmware.optional(), encryption: facts.encryption.optional(),
}).refine((d) => d.partNumber || d.model || d.serial, { message: NAMED, path: ["partNumber"] });
export type DriveInput = z.infer<typeof driveInput>;

const someChange = (c: object) => Object.keys(c).length > 0;
export const NO_CHANGE = "Name at least one field to change.";

export const driveCorrection = z.strictObject({
  changes: z.strictObject({ ...facts }).partial().refine(someChange, NO_CHANGE),
  reason,
});
export type DriveCorrection = z.infer<typeof driveCorrection>;

/** Label data as far as it is typed, to be warned of; `except` is the drive that is being corrected. */
export const driveLook = z.strictObject({ partNumber: maybe(z.string().trim().max(120)).optional(), serial: maybe(z.string().trim().max(120)).optional(), except: uuid.optional() });
export type DriveLook = z.infer<typeof driveLook>;
