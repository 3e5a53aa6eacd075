import { z } from "zod";
import { REASON_CHARACTERS } from "@/lib/core/approval";
import { approvalInput } from "@/lib/schemas/approval";

/** The sheet's form for one image: the typed digits are the page's own check, the rest goes to the server. */
export function decisionForm(sha256: string, reasonsFor: readonly string[]) {
  return z.object({
    statement: approvalInput.shape.statement,
    last8: z.string().refine((typed) => sameDigits(typed, sha256), "This isn’t the end of the digest on this sheet. Type the last group from above."),
    reasons: z.record(z.string(), z.string()),
  }).superRefine(({ reasons }, context) => {
    for (const code of reasonsFor) {
      if (reasonLength(reasons[code]) < REASON_CHARACTERS) context.addIssue({ code: "custom", path: ["reasons", code], message: `Write why, in at least ${REASON_CHARACTERS} characters.` });
    }
  });
}
export type DecisionForm = z.infer<ReturnType<typeof decisionForm>>;

export function reasonLength(text: string | undefined): number {
  return (text ?? "").trim().length;
}

/** The last 8 digits as typed, blanks and capitals aside. */
export function sameDigits(typed: string, sha256: string): boolean {
  return typed.replace(/\s+/g, "").toLowerCase() === sha256.slice(-8);
}
