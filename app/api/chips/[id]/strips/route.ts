import { handler } from "@/lib/http/handler";
import { chipStrips } from "@/lib/queries/chip-view";
import { stripInput } from "@/lib/schemas/read";

export const GET = handler({ input: stripInput }, ({ actor, params, input }) => chipStrips(actor, params.id, input));
