import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { mailList } from "@/lib/queries/mails";
import { listInput } from "@/lib/schemas/case";

export const GET = handler({ input: listInput }, ({ actor, input }) => mailList(actor, input));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
