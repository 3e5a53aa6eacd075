import { resumeCase } from "@/lib/commands/hold-case";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { resumeInput } from "@/lib/schemas/note";

export const POST = handler({ input: resumeInput }, ({ actor, params, input }) => resumeCase(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
