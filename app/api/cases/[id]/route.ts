import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { caseView } from "@/lib/queries/cases";

export const GET = handler({}, ({ actor, params }) => caseView(actor, params.id));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
