import { recordBoard } from "@/lib/commands/record-board";
import { handler } from "@/lib/http/handler";
import { boardInput } from "@/lib/schemas/board";

export const POST = handler({ input: boardInput, status: 201 }, ({ actor, params, input }) => recordBoard(actor, params.id, input));
