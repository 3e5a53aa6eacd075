import { handler } from "@/lib/http/handler";
import { mailList } from "@/lib/queries/mails";
import { listInput } from "@/lib/schemas/case";

export const GET = handler({ input: listInput }, ({ actor, input }) => mailList(actor, input));
