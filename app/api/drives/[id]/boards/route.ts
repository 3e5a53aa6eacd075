import { recordBoard } from "@/lib/commands/record-board";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { boardInput } from "@/lib/schemas/board";

export const POST = handler({ input: boardInput, status: 201 }, ({ actor, params, input }) => recordBoard(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
