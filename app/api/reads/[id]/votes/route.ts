import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { votes } from "@/lib/queries/votes";

/** The report behind a composite: which reads voted, and for each disputed byte who voted what. */
export const GET = handler({}, ({ actor, params }) => votes(actor, params.id));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
