import { handler } from "@/lib/http/handler";
import { benchRows } from "@/lib/queries/bench";

export const GET = handler({}, async ({ actor }) => ({ items: await benchRows(actor) }));
