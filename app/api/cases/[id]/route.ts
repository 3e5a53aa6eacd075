import { handler } from "@/lib/http/handler";
import { caseView } from "@/lib/queries/cases";

export const GET = handler({}, ({ actor, params }) => caseView(actor, params.id));
