import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { comparison } from "@/lib/queries/compare";
import { comparisonInput } from "@/lib/schemas/read";

export const GET = handler({ input: comparisonInput }, ({ actor, params, input }) => comparison(actor, params.id, input));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
