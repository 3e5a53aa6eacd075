import { withdrawShare } from "@/lib/commands/withdraw-share";
import { handler } from "@/lib/http/handler";

export const DELETE = handler({}, ({ actor, params }) => withdrawShare(actor, params.id));
