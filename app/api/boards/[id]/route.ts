import { correctBoard } from "@/lib/commands/correct-board";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { boardCorrection } from "@/lib/schemas/board";

export const PATCH = handler({ input: boardCorrection }, ({ actor, params, input }) => correctBoard(actor, params.id, input));
export const { GET, POST, PUT, DELETE, OPTIONS } = othersThan("PATCH");
