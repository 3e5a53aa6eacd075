import { changeKey } from "@/lib/commands/change-key";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { keyList } from "@/lib/queries/keys";
import { keyChangeInput } from "@/lib/schemas/seal";

export const GET = handler({}, ({ actor }) => keyList(actor));
export const POST = handler({ input: keyChangeInput, status: 201 }, ({ actor, input }) => changeKey(actor, input));
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
