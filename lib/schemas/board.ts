import { z } from "zod";
import { BOARD_ROLES } from "@/lib/core/words";
import { NO_CHANGE } from "./drive";
import { line, maybe, prose, reason } from "./text";

const facts = {
  boardNumber: line(120, "the board number printed on the board"),
  revision: maybe(line(60, "a revision")),
  controllerMarking: maybe(line(120, "the marking of the main controller")),
  motorDriverMarking: maybe(line(120, "the marking of the motor driver")),
  condition: maybe(prose(4000, "the condition")),
  dataInController: z.boolean(),
};

export const boardInput = z.strictObject({
  role: z.enum(BOARD_ROLES, "Say whether this is the original or the donor board."),
  boardNumber: facts.boardNumber,
  revision: facts.revision.optional(),
  controllerMarking: facts.controllerMarking.optional(),
  motorDriverMarking: facts.motorDriverMarking.optional(),
  condition: facts.condition.optional(),
  dataInController: facts.dataInController.optional(),
  reason: maybe(reason).optional(),
});
export type BoardInput = z.infer<typeof boardInput>;

export const boardCorrection = z.strictObject({
  changes: z.strictObject(facts).partial().refine((c) => Object.keys(c).length > 0, NO_CHANGE),
  reason,
});
export type BoardCorrection = z.infer<typeof boardCorrection>;
