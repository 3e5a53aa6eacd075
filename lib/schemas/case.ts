import { z } from "zod";
import { day, email, line, maybe, prose } from "./text";

export const caseInput = z.strictObject({
  customer: z.strictObject({
    name: line(200, "the customer's name"),
    email,
    phone: maybe(line(60, "a telephone number")).optional(),
    contact: maybe(line(200, "a contact")).optional(),
  }),
  damage: prose(4000, "an account of what happened to the drive"),
  note: maybe(prose(4000, "a note")).optional(),
  dueOn: maybe(day).optional(),
});
export type CaseInput = z.infer<typeof caseInput>;

export const listInput = z.object({
  q: z.string().max(200).default(""),
  sort: z.string().max(40).default(""),
  order: z.enum(["asc", "desc"]).default("asc"),
  page: z.coerce.number().int().min(1).max(100_000).default(1),
  pageSize: z.coerce.number().int().min(1).max(200).default(25),
});
export type ListInput = z.infer<typeof listInput>;

/** `requested`: the parcel is not here yet; `erasure-due`: closed, and the day of its images has come */
export const caseListInput = listInput.extend({ state: z.enum(["", "requested", "open", "closed", "erasure-due"]).default("") });
export type CaseListInput = z.input<typeof caseListInput> & ListInput;
