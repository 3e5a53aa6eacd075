import { approveImage } from "@/lib/commands/approve-image";
import { handler } from "@/lib/http/handler";
import { approvalInput } from "@/lib/schemas/approval";

export const POST = handler({ input: approvalInput, status: 201 }, ({ actor, params, input }) => approveImage(actor, params.id, input));
