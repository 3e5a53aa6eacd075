import { retryMail } from "@/lib/commands/retry-mail";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";

export const POST = handler({}, ({ actor, params }) => retryMail(actor, params.id));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
