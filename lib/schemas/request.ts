import { z } from "zod";
import { ENCLOSURES, IMPORTANCES, LOCKS } from "@/lib/core/request-words";
import { DAMAGES } from "@/lib/core/words";
import { day, email, line, prose } from "./text";

/** Characters that turn the reading direction around or break a line unseen: they could make a field say something else. */
const UNSEEN = /[\u0080-\u009f\u200e\u200f\u2028-\u202e\u2066-\u2069\ufeff]/;
const unseen = "Some invisible characters are in here. Type it again instead of pasting it.";
const typed = (max: number, what: string) => line(max, what).refine((s) => !UNSEEN.test(s), unseen);
/** Forms send line breaks as CR LF; one character is kept. */
const told = (max: number, what: string) => z.preprocess((value) => (typeof value === "string" ? value.replace(/\r\n?/g, "\n") : value), prose(max, what).refine((s) => !UNSEEN.test(s), unseen));
/** A field of nothing but spaces is one that was left out. */
const filled = <T extends z.ZodType>(schema: T) => z.preprocess((value) => (value === undefined || (typeof value === "string" && value.trim() === "") ? null : value), schema.nullable());
const other = (max: number, what: string) => filled(typed(max, what)).optional();

/** A box is ticked or not: forms send "yes", nothing, or an empty field. */
const tick = (say: string) => z.preprocess((value) => (value === true || value === "yes" ? "yes" : undefined), z.literal("yes", say));
const mayTick = z.preprocess((value) => (value === true || value === "yes" ? "yes" : null), z.literal("yes").nullable());
const choice = <T extends readonly [string, ...string[]]>(of: T, say: string) => z.enum(of, say);

const shape = {
  name: typed(200, "your name"),
  company: other(200, "a company"),
  email,
  phone: other(60, "a telephone number"),
  returnAddress: told(1000, "the address the parcel goes back to"),
  partNumber: other(120, "a part number"),
  serial: other(120, "a serial number"),
  model: other(120, "a model"),
  interface: other(60, "an interface"),
  capacity: other(40, "a capacity"),
  made: other(40, "month and year"),
  boardNumber: other(120, "a board number"),
  boardRevision: other(60, "a revision"),
  boardHidden: mayTick,
  enclosure: choice(ENCLOSURES, "Say whether the drive sat in an enclosure."),
  lock: choice(LOCKS, "Say whether a password or encryption is on the drive."),
  damage: choice(DAMAGES, "Say what happened. “I don’t know” is an answer, too."),
  happened: filled(told(2000, "what happened")).optional(),
  tried: filled(told(2000, "what was tried")).optional(),
  importance: choice(IMPORTANCES, "Say how much hangs on it."),
  neededBy: filled(day).optional(),
  consentOwner: tick("We can work only for the owner, or for whoever acts for the owner. Tick the line if that is you."),
  consentRead: tick("Without this leave we can’t read the chips. Tick the line, or ask us first."),
  consentWrite: tick("Without this leave there is nothing we could write the image to. Tick the line, or ask us first."),
  consentSolder: tick("Some chips can’t be reached otherwise. Tick the line, or ask us first."),
  /** the days that the ticked line named */
  keepDays: z.coerce.number({ error: "Load the page again: a number of it is missing." }).int().min(0).max(100_000),
  signature: typed(200, "your name as signature"),
};

/** Filled by programs only; and when the page was made, signed by the server. */
const guard = {
  website: z.string().max(2000).default(""),
  stamp: z.string({ error: "Load the page again, then send." }).max(100),
};

type Loose = { [K in "partNumber" | "serial" | "model" | "boardNumber" | "boardHidden"]?: unknown };
/** These two are asked even while other fields don't fit, so that all that is open shows at once. */
const always = { when: () => true };
const labelled = (f: Loose) => [f.partNumber, f.serial, f.model].some((value) => typeof value === "string" && value.trim() !== "");
const boarded = (f: Loose) => (typeof f.boardNumber === "string" && f.boardNumber.trim() !== "") || f.boardHidden === "yes" || f.boardHidden === true;
const LABEL = { message: "Type the part number from the enclosure. If there is none, the serial number or the model will do.", path: ["partNumber"], ...always };
const BOARD = { message: "Type the board number, or tick below that you can’t see it.", path: ["boardNumber"], ...always };

/** What the customer answers: stored as typed, one JSON object a request. */
export const requestAnswers = z.strictObject(shape).refine(labelled, LABEL).refine(boarded, BOARD);
export type RequestAnswers = z.output<typeof requestAnswers>;
export type RequestForm = z.input<typeof requestAnswers>;

export const requestInput = z.strictObject({ ...shape, ...guard }).refine(labelled, LABEL).refine(boarded, BOARD);
export type RequestInput = z.output<typeof requestInput>;

export const requestToken = z.string().max(100);
export const deletionInput = z.strictObject({ token: requestToken, message: filled(told(2000, "a message")).optional() });
export const withdrawalInput = z.strictObject({ token: requestToken });
