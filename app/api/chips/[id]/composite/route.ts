import { makeComposite } from "@/lib/commands/make-composite";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { compositeInput } from "@/lib/schemas/read";

export const POST = handler({ input: compositeInput, status: 201 }, ({ actor, params, input }) => makeComposite(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
