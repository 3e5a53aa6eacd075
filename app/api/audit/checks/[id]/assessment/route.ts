import { assessLog } from "@/lib/commands/assess-log";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { assessmentInput } from "@/lib/schemas/policy";

export const POST = handler({ input: assessmentInput, status: 201 }, ({ actor, params, input }) => assessLog(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
