import { z } from "zod";
import { ITEM_TYPES } from "@/lib/core/words";
import { line, maybe, prose, reason, uuid } from "./text";

const party = z.strictObject({ person: line(120, "who has it"), place: line(200, "where it is") });

export const handOverInput = z.strictObject({
  item: z.strictObject({ type: z.enum(ITEM_TYPES), id: uuid }),
  from: party,
  /** `userId` where the receiver has an account here: then they confirm themselves */
  to: party.extend({ userId: maybe(uuid).optional() }),
  condition: prose(2000, "the condition it is in"),
  sealNumber: maybe(line(80, "the seal's number")).optional(),
  note: maybe(prose(2000, "a note")).optional(),
});
export type HandOverInput = z.infer<typeof handOverInput>;

/** `text` says how somebody without an account confirmed, or why the item did not arrive. */
export const confirmationInput = z.discriminatedUnion("received", [
  z.strictObject({ received: z.literal(true), text: maybe(prose(500, "how it was confirmed", 3)).optional() }),
  z.strictObject({ received: z.literal(false), text: reason.max(500, "At most 500 characters.") }),
]);
export type ConfirmationInput = z.infer<typeof confirmationInput>;
