import { askForApproval } from "@/lib/commands/ask-for-approval";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { approvalRequestInput } from "@/lib/schemas/approval";

export const POST = handler({ input: approvalRequestInput, status: 201 }, ({ actor, params, input }) => askForApproval(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
