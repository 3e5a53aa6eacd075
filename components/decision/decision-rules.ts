import { z } from "zod";
import { REASON_CHARACTERS } from "@/lib/core/approval";
import { approvalInput } from "@/lib/schemas/approval";
import { reasonLength, sameDigits } from "./decision-form";

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
