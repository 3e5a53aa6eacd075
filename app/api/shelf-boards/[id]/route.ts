import { changeShelfBoard } from "@/lib/commands/change-shelf-board";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { shelfBoard } from "@/lib/queries/shelf";
import { shelfChange } from "@/lib/schemas/shelf";

export const GET = handler({}, ({ actor, params }) => shelfBoard(actor, params.id));
export const PATCH = handler({ input: shelfChange }, ({ actor, params, input }) => changeShelfBoard(actor, params.id, input));
export const { POST, PUT, DELETE, OPTIONS } = othersThan("GET", "PATCH");
