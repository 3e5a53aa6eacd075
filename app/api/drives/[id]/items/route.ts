import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { itemsOfDrive } from "@/lib/queries/items";

export const GET = handler({}, ({ actor, params }) => itemsOfDrive(actor, params.id));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
