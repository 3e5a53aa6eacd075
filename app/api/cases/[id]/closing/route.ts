import { closeCase } from "@/lib/commands/close-case";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { closingInput } from "@/lib/schemas/closing";

export const POST = handler({ input: closingInput }, ({ actor, params, input }) => closeCase(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
