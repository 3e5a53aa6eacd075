import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { benchRows } from "@/lib/queries/bench";
import { toReceive } from "@/lib/queries/receipts";

export const GET = handler({}, async ({ actor }) => ({ items: await benchRows(actor), toReceive: await toReceive(actor) }));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
