import { checkChain } from "@/lib/commands/check-chain";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";

export const POST = handler({}, ({ actor, params }) => checkChain(actor, params.id));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
