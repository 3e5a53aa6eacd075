import { revokeApproval } from "@/lib/commands/revoke-approval";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { reasonInput } from "@/lib/schemas/read";

export const POST = handler({ input: reasonInput }, ({ actor, params, input }) => revokeApproval(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
