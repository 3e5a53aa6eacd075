import { createCase } from "@/lib/commands/create-case";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { caseList } from "@/lib/queries/cases";
import { caseInput, caseListInput } from "@/lib/schemas/case";

export const GET = handler({ input: caseListInput }, ({ actor, input }) => caseList(actor, input));
export const POST = handler({ input: caseInput, status: 201 }, ({ actor, input }) => createCase(actor, input));
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
