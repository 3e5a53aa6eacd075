import { z } from "zod";
import { SHELF_STATES } from "@/lib/core/shelf";
import { BUSES } from "@/lib/core/words";
import { MAX_IMAGE_BYTES } from "@/lib/limits";
import { NO_CHANGE } from "./drive";
import { listInput } from "./case";
import { line, maybe, prose, reason, uuid } from "./text";

export const MAX_SHELF_CHIPS = 8;

/** A chip as far as it is known while its board lies on the shelf. */
export const shelfChip = z.strictObject({
  designator: line(16, "the reference designator, such as U12").regex(/^[A-Za-z]{1,4}[0-9]{1,5}[A-Za-z]?$/, "A designator is letters and a number, such as U12.").transform((s) => s.toUpperCase()),
  bus: maybe(z.enum(BUSES, `A bus is one of ${BUSES.join(", ")}.`)),
  sizeBytes: maybe(z.coerce.number({ error: "Give the size in bytes." }).int("A size is a whole number of bytes.").min(1, "A size is at least 1 byte.").max(MAX_IMAGE_BYTES, "The largest chip here is 64 MiB (67,108,864 bytes).")),
  package: maybe(line(60, "a package")),
  marking: maybe(line(120, "the marking")),
});

const chips = z.array(shelfChip).max(MAX_SHELF_CHIPS, `At most ${MAX_SHELF_CHIPS} chips a board.`)
  .refine((list) => new Set(list.map((chip) => chip.designator)).size === list.length, "Two chips have the same designator.");

const facts = {
  boardNumber: line(120, "the board number printed on the board"),
  revision: maybe(line(60, "a revision")),
  controllerMarking: maybe(line(120, "the marking of the main controller")),
  motorDriverMarking: maybe(line(120, "the marking of the motor driver")),
  chips,
  origin: maybe(line(200, "where it came from")),
  condition: maybe(prose(4000, "the condition")),
  place: maybe(line(120, "its place")),
  note: maybe(prose(4000, "a note")),
};
const reservedFor = maybe(line(20, "a case number"));

export const shelfInput = z.strictObject({
  boardNumber: facts.boardNumber,
  revision: facts.revision.optional(),
  controllerMarking: facts.controllerMarking.optional(),
  motorDriverMarking: facts.motorDriverMarking.optional(),
  chips: facts.chips.default([]),
  origin: facts.origin.optional(),
  condition: facts.condition.optional(),
  place: facts.place.optional(),
  note: facts.note.optional(),
  reservedFor: reservedFor.optional(),
});
export type ShelfInput = z.infer<typeof shelfInput>;

/** Where it lies, for whom it is kept and a note change as they do; a correction of what it is, and retiring it, need a reason. */
export const shelfChange = z.strictObject({
  changes: z.strictObject({ ...facts, reservedFor, retired: z.boolean() }).partial().refine((c) => Object.keys(c).length > 0, NO_CHANGE),
  reason: maybe(reason).optional(),
});
export type ShelfChange = z.infer<typeof shelfChange>;

export const takingInput = z.strictObject({ driveId: uuid, reason: maybe(reason).optional() });
export type TakingInput = z.infer<typeof takingInput>;

export const shelfListInput = listInput.extend({ state: z.enum(["", ...SHELF_STATES]).default(""), format: z.enum(["json", "csv"]).default("json") });
export type ShelfListInput = z.infer<typeof shelfListInput>;

/** The fields beside the file. A misspelt one is refused: a file that was only to be tried must not be taken. */
export const importFields = z.strictObject({
  try: z.enum(["yes", "no"], "Say whether this is only tried: yes or no.").default("no"),
  reason: maybe(reason).optional(),
}, { error: (issue) => (issue.code === "unrecognized_keys" ? "Beside the file only the fields try and reason are taken. Leave the others out." : undefined) });
