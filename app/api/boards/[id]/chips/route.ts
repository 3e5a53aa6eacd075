import { recordChip } from "@/lib/commands/record-chip";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { chipInput } from "@/lib/schemas/chip";

export const POST = handler({ input: chipInput, status: 201 }, ({ actor, params, input }) => recordChip(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
