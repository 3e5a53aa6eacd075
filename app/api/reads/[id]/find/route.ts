import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { findInRead } from "@/lib/queries/read-bytes";
import { findBytesInput } from "@/lib/schemas/read";

export const GET = handler({ input: findBytesInput }, ({ actor, params, input }) => findInRead(actor, params.id, input));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
