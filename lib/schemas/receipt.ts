import { z } from "zod";
import { AS_SENT } from "@/lib/core/words";
import { day, line, maybe, prose } from "./text";

/** One line of the request beside what was in the parcel. */
const compared = z.strictObject({
  what: line(80, "what was compared"),
  asSent: z.enum(AS_SENT, "Say whether it is as sent."),
  text: maybe(prose(300, "what is different")).optional(),
}).refine((l) => l.asSent !== "no" || Boolean(l.text), { message: "Say what is different.", path: ["text"] });

export const receiptInput = z.strictObject({
  carrier: maybe(line(120, "the carrier")).optional(),
  tracking: maybe(line(120, "the tracking number")).optional(),
  sealAsSent: z.enum(AS_SENT, "Look at the seal and choose one."),
  sealNumber: maybe(line(80, "the seal's number")).optional(),
  smallBoard: z.enum(AS_SENT, "Look for the enclosure's small board and choose one."),
  parcelCondition: prose(2000, "the condition of the parcel"),
  accessories: maybe(prose(1000, "what else came")).optional(),
  lines: z.array(compared).max(12, "At most 12 lines.").optional(),
  differs: maybe(prose(1000, "what else is different")).optional(),
  /** until when it is promised; goes into the log as a correction of the case */
  dueOn: maybe(day).optional(),
});
export type ReceiptInput = z.infer<typeof receiptInput>;
