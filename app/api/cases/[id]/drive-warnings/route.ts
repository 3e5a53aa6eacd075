import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { warningsWhileTyping } from "@/lib/queries/drives";
import { driveLook } from "@/lib/schemas/drive";

export const GET = handler({ input: driveLook }, ({ actor, params, input }) => warningsWhileTyping(actor, params.id, input));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
