import { sendSummary } from "@/lib/commands/send-summary";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";

export const POST = handler({ status: 201 }, ({ actor, params }) => sendSummary(actor, params.id));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
