import { changePolicy } from "@/lib/commands/change-policy";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { policyView } from "@/lib/queries/policy";
import { policyInput } from "@/lib/schemas/policy";

export const GET = handler({}, ({ actor }) => policyView(actor));
export const PUT = handler({ input: policyInput }, ({ actor, input }) => changePolicy(actor, input));
export const { POST, PATCH, DELETE, OPTIONS } = othersThan("GET", "PUT");
