import { sendBack } from "@/lib/commands/ask-for-approval";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { reasonInput } from "@/lib/schemas/read";

export const POST = handler({ input: reasonInput }, ({ actor, params, input }) => sendBack(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
