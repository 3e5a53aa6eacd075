import { retryMail } from "@/lib/commands/retry-mail";
import { handler } from "@/lib/http/handler";

export const POST = handler({}, ({ actor, params }) => retryMail(actor, params.id));
