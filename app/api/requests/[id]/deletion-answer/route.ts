import { answerDeletion } from "@/lib/commands/answer-deletion";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { deletionAnswerInput } from "@/lib/schemas/erasure";

export const POST = handler({ input: deletionAnswerInput }, ({ actor, params, input }) => answerDeletion(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
