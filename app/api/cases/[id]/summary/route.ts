import { sendSummary } from "@/lib/commands/send-summary";
import { handler } from "@/lib/http/handler";

export const POST = handler({ status: 201 }, ({ actor, params }) => sendSummary(actor, params.id));
