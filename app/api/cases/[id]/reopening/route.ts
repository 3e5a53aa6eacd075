import { reopenCase } from "@/lib/commands/reopen-case";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { reopeningInput } from "@/lib/schemas/closing";

export const POST = handler({ input: reopeningInput }, ({ actor, params, input }) => reopenCase(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
