import { changeUser } from "@/lib/commands/change-user";
import { handler } from "@/lib/http/handler";
import { userChange } from "@/lib/schemas/user";

export const PATCH = handler({ input: userChange, secret: true }, ({ actor, params, input }) => changeUser(actor, params.id, input));
