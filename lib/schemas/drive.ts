import { z } from "zod";
import { line, maybe, reason } from "./text";

const facts = {
  partNumber: maybe(line(120, "a part number")),
  model: maybe(line(120, "a model")),
  serial: maybe(line(120, "a serial number")),
  interface: maybe(line(60, "an interface")),
};
const NAMED = "Give at least one of part number, model and serial number.";

export const driveInput = z.strictObject({
  partNumber: facts.partNumber.optional(), model: facts.model.optional(), serial: facts.serial.optional(), interface: facts.interface.optional(),
}).refine((d) => d.partNumber || d.model || d.serial, { message: NAMED, path: ["partNumber"] });
export type DriveInput = z.infer<typeof driveInput>;

const someChange = (c: object) => Object.keys(c).length > 0;
export const NO_CHANGE = "Name at least one field to change.";

export const driveCorrection = z.strictObject({
  changes: z.strictObject({ ...facts }).partial().refine(someChange, NO_CHANGE),
  reason,
});
export type DriveCorrection = z.infer<typeof driveCorrection>;
