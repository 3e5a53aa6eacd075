import { handler } from "@/lib/http/handler";
import { comparison } from "@/lib/queries/compare";
import { comparisonInput } from "@/lib/schemas/read";

export const GET = handler({ input: comparisonInput }, ({ actor, params, input }) => comparison(actor, params.id, input));
