import { changeUser } from "@/lib/commands/change-user";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { userChange } from "@/lib/schemas/user";

export const PATCH = handler({ input: userChange, secret: true }, ({ actor, params, input }) => changeUser(actor, params.id, input));
export const { GET, POST, PUT, DELETE, OPTIONS } = othersThan("PATCH");
