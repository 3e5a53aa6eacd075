import { returnCase } from "@/lib/commands/return-case";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { returnInput } from "@/lib/schemas/closing";

export const POST = handler({ input: returnInput, status: 201 }, ({ actor, params, input }) => returnCase(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
