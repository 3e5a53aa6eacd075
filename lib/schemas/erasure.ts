import { z } from "zod";
import { day, line, maybe, prose, reason } from "./text";

export const erasureInput = z.strictObject({
  /** typed by hand, with or without its check character */
  caseRef: line(20, "the case number"),
  reason,
});
export type ErasureInput = z.infer<typeof erasureInput>;

export const keepingInput = z.strictObject({
  /** null ends the keeping */
  until: maybe(day),
  reason,
});
export type KeepingInput = z.infer<typeof keepingInput>;

export const deletionAnswerInput = z.strictObject({ answer: prose(2000, "an answer", 3) });
export type DeletionAnswerInput = z.infer<typeof deletionAnswerInput>;
