import { correctCase } from "@/lib/commands/correct-case";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { caseView } from "@/lib/queries/cases";
import { caseCorrection } from "@/lib/schemas/note";

export const GET = handler({}, ({ actor, params }) => caseView(actor, params.id));
export const PATCH = handler({ input: caseCorrection }, ({ actor, params, input }) => correctCase(actor, params.id, input));
export const { POST, PUT, DELETE, OPTIONS } = othersThan("GET", "PATCH");
