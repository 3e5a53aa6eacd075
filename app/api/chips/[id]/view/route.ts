import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { chipView } from "@/lib/queries/chip-view";

/** Everything the chip page draws, for its refreshes. */
export const GET = handler({}, ({ actor, params }) => chipView(actor, params.id));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
