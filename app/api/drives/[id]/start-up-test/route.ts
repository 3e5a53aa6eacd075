import { recordStartUp } from "@/lib/commands/record-start-up";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { startUpInput } from "@/lib/schemas/start-up";

export const POST = handler({ input: startUpInput, status: 201 }, ({ actor, params, input }) => recordStartUp(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
