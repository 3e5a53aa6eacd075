import { recordTransfer } from "@/lib/commands/record-transfer";
import { handler } from "@/lib/http/handler";
import { transferInput } from "@/lib/schemas/approval";

export const POST = handler({ input: transferInput, status: 201 }, ({ actor, params, input }) => recordTransfer(actor, params.id, input));
