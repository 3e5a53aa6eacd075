import { handler } from "@/lib/http/handler";
import { chipView } from "@/lib/queries/chip-view";

/** Everything the chip page draws, for its refreshes. */
export const GET = handler({}, ({ actor, params }) => chipView(actor, params.id));
