import { z } from "zod";

const count = (min: number, what: string) => z.coerce.number({ error: `Give a number of ${what}.` }).int("Give a whole number.").min(min, `At least ${min}.`).max(30, "At most 30.");
const days = z.coerce.number().int("Give whole days.").min(1, "At least 1 day.").max(3650, "At most 3,650 days.");

export const policyInput = z.strictObject({
  reads: count(2, "agreeing reads"),
  seatings: count(1, "seatings"),
  readBacks: count(1, "read-backs"),
  readBackSeatings: count(1, "seatings"),
  twoPersonRule: z.boolean(),
  secondFactor: z.literal(false, "The second factor isn't available yet: leave it off."),
  shareDays: days,
  erasureDays: days,
}).refine((p) => p.seatings <= p.reads, { path: ["seatings"], message: "There can't be more seatings than reads." })
  .refine((p) => p.readBackSeatings <= p.readBacks, { path: ["readBackSeatings"], message: "There can't be more seatings than read-backs." });
export type PolicyInput = z.infer<typeof policyInput>;

export const assessmentInput = z.strictObject({ text: z.string().trim().min(10, "Say what you looked at and what you conclude, at least 10 characters.").max(4000) });
