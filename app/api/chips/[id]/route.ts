import { correctChip } from "@/lib/commands/correct-chip";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { chipFlatView } from "@/lib/queries/chip-view";
import { chipCorrection } from "@/lib/schemas/chip";

export const GET = handler({}, ({ actor, params }) => chipFlatView(actor, params.id));
export const PATCH = handler({ input: chipCorrection }, ({ actor, params, input }) => correctChip(actor, params.id, input));
export const { POST, PUT, DELETE, OPTIONS } = othersThan("GET", "PATCH");
