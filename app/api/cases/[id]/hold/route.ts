import { holdCase } from "@/lib/commands/hold-case";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { holdInput } from "@/lib/schemas/note";

export const POST = handler({ input: holdInput }, ({ actor, params, input }) => holdCase(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
