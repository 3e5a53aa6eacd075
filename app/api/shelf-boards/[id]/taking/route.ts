import { takeFromShelf } from "@/lib/commands/take-from-shelf";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { takingInput } from "@/lib/schemas/shelf";

export const POST = handler({ input: takingInput, status: 201 }, ({ actor, params, input }) => takeFromShelf(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
