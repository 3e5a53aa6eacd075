import { createUser } from "@/lib/commands/create-user";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { userList } from "@/lib/queries/users";
import { userInput } from "@/lib/schemas/user";

export const GET = handler({}, async ({ actor }) => ({ items: await userList(actor) }));
export const POST = handler({ input: userInput, status: 201, secret: true }, ({ actor, input }) => createUser(actor, input));
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
