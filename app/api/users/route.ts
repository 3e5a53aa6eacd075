import { createUser } from "@/lib/commands/create-user";
import { handler } from "@/lib/http/handler";
import { userList } from "@/lib/queries/users";
import { userInput } from "@/lib/schemas/user";

export const GET = handler({}, async ({ actor }) => ({ items: await userList(actor) }));
export const POST = handler({ input: userInput, status: 201, secret: true }, ({ actor, input }) => createUser(actor, input));
