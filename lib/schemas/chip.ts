import { z } from "zod";
import { BUSES, SIZE_SOURCES } from "@/lib/core/words";
import { MAX_IMAGE_BYTES } from "@/lib/limits";
import { NO_CHANGE } from "./drive";
import { line, maybe, reason, uuid } from "./text";

export const millivolts = z.union([z.literal("unknown"), z.coerce.number().int("Give whole millivolts.").min(500, "Give the supply in millivolts, such as 3300.").max(20_000, "Give the supply in millivolts, such as 3300.")], "Give the supply in millivolts, or say that it is unknown.");

/** Bytes as a person pastes them: hex digits with any space or 0x between them. */
const hexText = (what: string) => z.string({ error: `Give ${what}.` }).max(20_000).transform((s) => s.toLowerCase().replace(/0x|[\s,:;-]/g, ""))
  .refine((s) => /^([0-9a-f]{2})+$/.test(s), `Give ${what} as hex digits, two a byte.`);

/** Thousandths of the picture's width or height. */
const place = z.int("A place is a whole number from 0 to 1000.").min(0, "A place is a whole number from 0 to 1000.").max(1000, "A place is a whole number from 0 to 1000.").nullable();

const facts = {
  designator: line(16, "the reference designator, such as U12").regex(/^[A-Za-z]{1,4}[0-9]{1,5}[A-Za-z]?$/, "A designator is letters and a number, such as U12.").transform((s) => s.toUpperCase()),
  bus: z.enum(BUSES, "Choose the bus."),
  sizeBytes: z.coerce.number({ error: "Give the size in bytes." }).int("A size is a whole number of bytes.").min(1, "A size is at least 1 byte.").max(MAX_IMAGE_BYTES, "The largest chip here is 64 MiB (67,108,864 bytes)."),
  sizeSource: z.enum(SIZE_SOURCES),
  supplyMillivolts: millivolts,
  package: maybe(line(60, "a package")),
  marking: maybe(line(120, "the marking")),
  holds: maybe(line(120, "what the chip holds")),
  idBytes: maybe(hexText("the three bytes of the id").refine((s) => s.length === 6, "An id has 3 bytes, such as 20 40 13.")),
  sfdp: maybe(hexText("the dump").refine((s) => s.length >= 32 && s.length <= 4096, "A dump has 16 to 2,048 bytes.")),
  needsTransfer: z.boolean(),
};

export const chipInput = z.strictObject({
  ...facts,
  sizeSource: facts.sizeSource.default("typed"),
  package: facts.package.optional(),
  marking: facts.marking.optional(),
  holds: facts.holds.optional(),
  idBytes: facts.idBytes.optional(),
  sfdp: facts.sfdp.optional(),
  needsTransfer: facts.needsTransfer.default(true),
  pairedWith: maybe(uuid).optional(),
});
export type ChipInput = z.infer<typeof chipInput>;

export const chipCorrection = z.strictObject({
  changes: z.strictObject({ ...facts, pairedWith: maybe(uuid), placeX: place, placeY: place }).partial().refine((c) => Object.keys(c).length > 0, NO_CHANGE)
    .refine((c) => (c.placeX === undefined) === (c.placeY === undefined) && (c.placeX == null) === (c.placeY == null), { message: "Give both numbers of the place, or neither.", path: ["placeX"] }),
  reason,
});
export type ChipCorrection = z.infer<typeof chipCorrection>;
