import { approveImage } from "@/lib/commands/approve-image";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { approvalInput } from "@/lib/schemas/approval";

export const POST = handler({ input: approvalInput, status: 201 }, ({ actor, params, input }) => approveImage(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
