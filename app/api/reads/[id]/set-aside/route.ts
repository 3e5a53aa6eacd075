import { setReadAside } from "@/lib/commands/set-read-aside";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { reasonInput } from "@/lib/schemas/read";

export const POST = handler({ input: reasonInput }, ({ actor, params, input }) => setReadAside(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
