import { handOverItem } from "@/lib/commands/hand-over-item";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { handOverInput } from "@/lib/schemas/hand-over";

export const POST = handler({ input: handOverInput, status: 201 }, ({ actor, params, input }) => handOverItem(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
