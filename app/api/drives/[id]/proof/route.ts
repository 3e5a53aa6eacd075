import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { driveProof } from "@/lib/queries/seals";
import { proofInput } from "@/lib/schemas/seal";

export const GET = handler({ input: proofInput }, ({ actor, params, input }) => driveProof(actor, params.id, input.seal));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
