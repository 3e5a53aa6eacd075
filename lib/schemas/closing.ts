import { z } from "zod";
import { CLOSED_KINDS } from "@/lib/core/words";
import { line, maybe, prose, reason } from "./text";

export const returnInput = z.strictObject({
  items: z.array(line(300, "what goes back")).min(1, "Tick at least one thing that goes back.").max(60, "At most 60 lines."),
  toPerson: line(120, "to whom it goes"),
  carrier: maybe(line(120, "the carrier")).optional(),
  tracking: maybe(line(120, "the tracking number")).optional(),
  sealNumber: maybe(line(80, "the seal's number")).optional(),
  note: maybe(prose(2000, "a note")).optional(),
});
export type ReturnInput = z.infer<typeof returnInput>;

export const closingInput = z.strictObject({
  kind: z.enum(CLOSED_KINDS, "Say how the case ends."),
  reason: maybe(reason).optional(),
});
export type ClosingInput = z.infer<typeof closingInput>;

export const reopeningInput = z.strictObject({ reason });
export type ReopeningInput = z.infer<typeof reopeningInput>;
