import { recordChip } from "@/lib/commands/record-chip";
import { handler } from "@/lib/http/handler";
import { chipInput } from "@/lib/schemas/chip";

export const POST = handler({ input: chipInput, status: 201 }, ({ actor, params, input }) => recordChip(actor, params.id, input));
