import { createBenchToken } from "@/lib/commands/create-bench-token";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { tokenList } from "@/lib/queries/users";
import { tokenInput } from "@/lib/schemas/user";

export const GET = handler({}, async ({ actor }) => ({ items: await tokenList(actor) }));
export const POST = handler({ input: tokenInput, status: 201, secret: true }, ({ actor, input }) => createBenchToken(actor, { name: input.name, userId: actor.id }));
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
