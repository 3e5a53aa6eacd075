import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { chipStrips } from "@/lib/queries/chip-view";
import { stripInput } from "@/lib/schemas/read";

export const GET = handler({ input: stripInput }, ({ actor, params, input }) => chipStrips(actor, params.id, input));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
