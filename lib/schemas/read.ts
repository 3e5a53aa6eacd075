import { z } from "zod";
import { hexPairs, MOST_SOUGHT } from "@/lib/core/find-bytes";
import { FORMATS, METHODS, STAGES } from "@/lib/core/words";
import { millivolts } from "./chip";
import { line, maybe, prose, reason } from "./text";

const time = z.iso.datetime({ offset: true, error: "Give a time such as 2026-11-03T09:14:05Z." });

/** A whole number in decimal or as 0x and hex digits. */
const address = (what: string) => z.string().trim().regex(/^(0x[0-9a-fA-F]{1,8}|\d{1,10})$/, `Give ${what} as a number, such as 4096 or 0x1000.`).transform(Number);

/** The text fields of an upload (API.md); everything arrives as text. Per-file fields are lists in the files' order. */
export const readFields = z.strictObject({
  stage: z.enum(STAGES, "Say which content it is: before (of the original), donor or after."),
  seating: z.coerce.number({ error: "Give the seating as a whole number from 1." }).int("Give the seating as a whole number from 1.").min(1, "Seatings count from 1.").max(9999, "Seatings count from 1 to 9999."),
  reader: line(120, "the reader that took the image"),
  method: maybe(z.enum(METHODS, "The method is in-place, lifted or socket.")).optional(),
  toolVersion: maybe(line(120, "a tool version")).optional(),
  adapter: maybe(line(120, "an adapter")).optional(),
  supplyMillivolts: maybe(millivolts).optional(),
  clockKilohertz: maybe(z.coerce.number().int("Give whole kilohertz.").min(1).max(1_000_000)).optional(),
  controllerHeld: maybe(z.enum(["true", "false"], "Say true or false.").transform((s) => s === "true")).optional(),
  note: maybe(prose(4000, "a note")).optional(),
  format: z.enum(FORMATS, "The format is raw, intel-hex or s-record.").default("raw"),
  base: maybe(address("the address of the image's first byte")).optional(),
  size: maybe(address("the image's size in bytes")).optional(),
  fill: maybe(address("the value of bytes that the text leaves out").refine((n) => n <= 255, "A fill is one byte, 0 to 255, such as 0xFF.")).optional(),
  sha256: z.array(z.string().regex(/^[0-9a-fA-F]{64}$/, "A SHA-256 has 64 hex digits.").transform((s) => s.toLowerCase())).default([]),
  modifiedAt: z.array(maybe(time)).default([]),
  takenAt: z.array(maybe(time)).default([]),
});
export type ReadFields = z.infer<typeof readFields>;

export const reasonInput = z.strictObject({ reason });
export type ReasonInput = z.infer<typeof reasonInput>;

export const handOutInput = z.strictObject({ reason: maybe(reason).optional(), format: z.enum(FORMATS, "The format is raw, intel-hex or s-record.").default("raw") });

export const compositeInput = z.strictObject({
  reads: z.array(z.number().int().min(1), "Name the reads, such as [1, 2, 3].").min(3, "A composite needs at least 3 reads.").max(100).refine((list) => new Set(list).size === list.length, "Name each read once."),
  reason,
});
export type CompositeInput = z.infer<typeof compositeInput>;

export const comparisonInput = z.object({
  reads: z.string({ error: "Name two reads, such as reads=1,2." }).regex(/^\d{1,5},\d{1,5}$/, "Name two reads, such as reads=1,2.").transform((s) => s.split(",").map(Number) as [number, number]),
  stage: z.enum(STAGES).default("before"),
});

const LIST_OF_READS = "Name two or three reads, such as reads=1,2 or reads=1,2,3.";

/** Two or three different reads, or the same one twice. */
export const comparedInput = z.object({
  reads: z.string({ error: LIST_OF_READS }).regex(/^\d{1,5}(,\d{1,5}){1,2}$/, LIST_OF_READS).transform((s) => s.split(",").map(Number))
    .refine((list) => list.length === 2 || new Set(list).size === list.length, "Name each of three reads once."),
  stage: z.enum(STAGES).default("before"),
});

export const bytesInput = z.object({
  offset: z.coerce.number().int().min(0, "An offset counts from 0.").default(0),
  length: z.coerce.number().int().min(1).max(65_536, "At most 65,536 bytes a window.").default(4096),
});

/** Either bytes as pairs of hex digits or a text, from an address on or backwards. */
export const findBytesInput = z.object({
  bytes: z.string().transform((text, context) => hexPairs(text) ?? (context.addIssue("Give bytes as pairs of hex digits, such as 5A A5."), z.NEVER))
    .refine((bytes) => bytes.length <= MOST_SOUGHT, `Search for at most ${MOST_SOUGHT} bytes.`).optional(),
  text: z.string().min(1, "Give the text to search for.").max(MOST_SOUGHT, `Search for at most ${MOST_SOUGHT} characters.`).optional(),
  from: z.coerce.number().int().min(0, "Addresses count from 0.").default(0),
  way: z.enum(["next", "previous"], "The way is next or previous.").default("next"),
}).refine(({ bytes, text }) => (bytes === undefined) !== (text === undefined), "Give either bytes=5AA5 or text=BOOT.");

export const stripInput = z.object({ offset: z.coerce.number().int().min(0).default(0), length: z.coerce.number().int().min(256).optional() });

export const findInput = z.object({
  digest: z.string({ error: "Give a digest." }).trim().regex(/^(0x)?[0-9a-fA-F]{8,64}$/, "Give at least 8 hex digits of a SHA-256, or a CRC-32.").transform((s) => s.replace(/^0x/, "").toLowerCase()),
});
