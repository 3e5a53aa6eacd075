import { z } from "zod";
import { BUSES, SIZE_SOURCES } from "@/lib/core/words";
import { MAX_IMAGE_BYTES } from "@/lib/limits";
import { NO_CHANGE } from "./drive";
import { line, maybe, reason, uuid } from "./text";

export const millivolts = z.union([z.literal("unknown"), z.coerce.number().int("Give whole millivolts.").min(500, "Give the supply in millivolts, such as 3300.").max(20_000, "Give the supply in millivolts, such as 3300.")], "Give the supply in millivolts, or say that it is unknown.");

const facts = {
  designator: line(16, "the reference designator, such as U12").regex(/^[A-Za-z]{1,4}[0-9]{1,5}[A-Za-z]?$/, "A designator is letters and a number, such as U12.").transform((s) => s.toUpperCase()),
  bus: z.enum(BUSES, "Choose the bus."),
  sizeBytes: z.coerce.number({ error: "Give the size in bytes." }).int("A size is a whole number of bytes.").min(1, "A size is at least 1 byte.").max(MAX_IMAGE_BYTES, "The largest chip here is 64 MiB (67,108,864 bytes)."),
  sizeSource: z.enum(SIZE_SOURCES),
  supplyMillivolts: millivolts,
  package: maybe(line(60, "a package")),
  marking: maybe(line(120, "the marking")),
  holds: maybe(line(120, "what the chip holds")),
  needsTransfer: z.boolean(),
};

export const chipInput = z.strictObject({
  ...facts,
  sizeSource: facts.sizeSource.default("typed"),
  package: facts.package.optional(),
  marking: facts.marking.optional(),
  holds: facts.holds.optional(),
  needsTransfer: facts.needsTransfer.default(true),
  pairedWith: maybe(uuid).optional(),
});
export type ChipInput = z.infer<typeof chipInput>;

export const chipCorrection = z.strictObject({
  changes: z.strictObject({ ...facts, pairedWith: maybe(uuid) }).partial().refine((c) => Object.keys(c).length > 0, NO_CHANGE),
  reason,
});
export type ChipCorrection = z.infer<typeof chipCorrection>;
