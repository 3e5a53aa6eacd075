import { z } from "zod";
import { chipCorrection, chipInput } from "@/lib/schemas/chip";
import { sizeFromText } from "./size-words";

const facts = chipCorrection.shape.changes.shape;

/** The size may be typed with a unit; whatever isn't understood goes on to the schema, which says so. */
const typedSize = z.preprocess((value) => (typeof value === "string" ? sizeFromText(value) ?? (value.trim() === "" ? Number.NaN : value) : value), chipInput.shape.sizeBytes);

/** The supply is asked for each time: an empty choice is no answer. */
const askedSupply = z.preprocess((value) => (value === "" ? undefined : value), chipInput.shape.supplyMillivolts);

const fields = {
  designator: chipInput.shape.designator, bus: chipInput.shape.bus, sizeBytes: typedSize, sizeSource: chipInput.shape.sizeSource,
  supplyMillivolts: askedSupply, package: facts.package, marking: facts.marking, holds: facts.holds,
  idBytes: facts.idBytes, sfdp: facts.sfdp,
  needsTransfer: chipInput.shape.needsTransfer, pairedWith: facts.pairedWith,
};

/** A new chip, as the form takes it. */
export const chipForm = z.strictObject(fields);
/** A correction: the same fields, and why. */
export const chipCorrectionForm = z.strictObject({ ...fields, reason: chipCorrection.shape.reason });

export type ChipFormInput = z.input<typeof chipForm>;
export type ChipFormOutput = z.output<typeof chipForm>;
export type ChipField = keyof ChipFormOutput;
