import { z } from "zod";
import { WAITING_FOR } from "@/lib/core/words";
import { day, email, line, maybe, prose, reason, uuid } from "./text";

export const holdInput = z.strictObject({ waitingFor: z.enum(WAITING_FOR, "Say whom or what it waits for."), reason });
export type HoldInput = z.infer<typeof holdInput>;

export const resumeInput = z.strictObject({ reason: maybe(reason).optional() });
export type ResumeInput = z.infer<typeof resumeInput>;

export const noteInput = z.strictObject({
  text: prose(4000, "the note", 3),
  /** when it happened, where that was not just now; RFC 3339 */
  happenedAt: maybe(z.iso.datetime({ offset: true, error: "Give a day and a time." })).optional(),
  driveId: maybe(uuid).optional(),
  /** the note that this one corrects */
  corrects: maybe(uuid).optional(),
});
export type NoteInput = z.infer<typeof noteInput>;

export const caseCorrection = z.strictObject({
  changes: z.strictObject({
    damage: prose(4000, "what happened to the drive").optional(),
    note: maybe(prose(4000, "a note")).optional(),
    dueOn: maybe(day).optional(),
    customerName: line(200, "the customer's name").optional(),
    customerEmail: email.optional(),
    customerPhone: maybe(line(60, "a telephone number")).optional(),
    customerCompany: maybe(line(200, "a company")).optional(),
    returnAddress: maybe(prose(1000, "an address")).optional(),
  }),
  reason,
});
export type CaseCorrection = z.infer<typeof caseCorrection>;
