import { recordTransfer } from "@/lib/commands/record-transfer";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { transferInput } from "@/lib/schemas/approval";

export const POST = handler({ input: transferInput, status: 201 }, ({ actor, params, input }) => recordTransfer(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
