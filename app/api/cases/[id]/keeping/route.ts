import { keepLonger } from "@/lib/commands/keep-longer";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { keepingInput } from "@/lib/schemas/erasure";

export const POST = handler({ input: keepingInput }, ({ actor, params, input }) => keepLonger(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
