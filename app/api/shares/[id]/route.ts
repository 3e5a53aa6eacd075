import { withdrawShare } from "@/lib/commands/withdraw-share";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";

export const DELETE = handler({}, ({ actor, params }) => withdrawShare(actor, params.id));
export const { GET, POST, PUT, PATCH, OPTIONS } = othersThan("DELETE");
