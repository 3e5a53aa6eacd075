import { confirmHandOver } from "@/lib/commands/confirm-hand-over";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { confirmationInput } from "@/lib/schemas/hand-over";

export const POST = handler({ input: confirmationInput }, ({ actor, params, input }) => confirmHandOver(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
