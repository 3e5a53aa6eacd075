import { z } from "zod";
import { day } from "./text";

/** One way to ask for every list of the audit pages: words, a choice, a person, days, order, page. */
export const auditInput = z.object({
  q: z.string().max(200).default(""),
  /** what the list offers to choose from: an action, a state */
  what: z.string().max(40).default(""),
  who: z.string().max(120).default(""),
  from: z.union([z.literal(""), day]).default(""),
  to: z.union([z.literal(""), day]).default(""),
  sort: z.string().max(40).default(""),
  order: z.enum(["asc", "desc"]).default("desc"),
  page: z.coerce.number().int().min(1).max(100_000).default(1),
  pageSize: z.coerce.number().int().min(1).max(200).default(25),
});
export type AuditInput = z.infer<typeof auditInput>;

/** The interface gives a list as JSON, a page of it, or as CSV, all of it. */
export const auditAsked = auditInput.extend({ format: z.enum(["json", "csv"]).default("json") });
export type AuditAsked = z.infer<typeof auditAsked>;

/** Words of an address that may be nonsense: such a list begins at its beginning, in its own order. */
export function auditInputOf(query: Record<string, string | string[] | undefined>, own: { sort: string; order: "asc" | "desc" }): AuditInput {
  const parsed = auditInput.safeParse({ ...own, ...query });
  return parsed.success ? parsed.data : auditInput.parse(own);
}
