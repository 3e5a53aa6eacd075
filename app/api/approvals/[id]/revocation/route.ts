import { revokeApproval } from "@/lib/commands/revoke-approval";
import { handler } from "@/lib/http/handler";
import { reasonInput } from "@/lib/schemas/read";

export const POST = handler({ input: reasonInput }, ({ actor, params, input }) => revokeApproval(actor, params.id, input));
