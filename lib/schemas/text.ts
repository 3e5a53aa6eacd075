import { z } from "zod";

/** A line that a person typed: trimmed at the ends, no control characters, well-formed Unicode; otherwise kept as it is. */
export function line(max: number, what: string) {
  return z.string({ error: `Give ${what}.` }).trim().min(1, `Give ${what}.`).max(max, `At most ${max} characters.`)
    .refine((s) => !/[\u0000-\u001f\u007f]/.test(s), "Line breaks and control characters don't belong here.")
    .refine((s) => s.isWellFormed(), "Some characters are broken. Type it again.");
}

/** Several lines of text. */
export function prose(max: number, what: string, min = 1) {
  return z.string({ error: `Give ${what}.` }).trim().min(min, min === 1 ? `Give ${what}.` : `Give ${what}, at least ${min} characters.`).max(max, `At most ${max} characters.`)
    .refine((s) => !/[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f]/.test(s), "Control characters don't belong here.")
    .refine((s) => s.isWellFormed(), "Some characters are broken. Type it again.");
}

/** An optional text: an empty field counts as left out. */
export function maybe<T extends z.ZodType>(schema: T) {
  return z.preprocess((value) => (value === "" || value === undefined ? null : value), schema.nullable());
}

export const email = line(254, "an e-mail address").pipe(z.email("This doesn't look like an e-mail address."))
  .refine((s) => /^[\x21-\x7e]+$/.test(s) && !/[",;<>()\\]/.test(s), "Only plain addresses such as name@example.org work here.");
export const reason = prose(2000, "a reason", 3);
export const uuid = z.uuid("This is not an id.");
/** A calendar day that there is: a parser of dates takes 30 February for 2 March. */
const isDay = (s: string) => {
  const at = new Date(`${s}T00:00:00Z`);
  return !Number.isNaN(at.getTime()) && at.toISOString().startsWith(s);
};
export const day = z.string().regex(/^\d{4}-\d{2}-\d{2}$/, "Give a date as year-month-day.").refine(isDay, "There is no such day.");
