import { eraseImages } from "@/lib/commands/erase-images";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { erasureView } from "@/lib/queries/erasure";
import { erasureInput } from "@/lib/schemas/erasure";

export const GET = handler({}, async ({ actor, params }) => ({ erasure: await erasureView(actor, params.id) }));
export const POST = handler({ input: erasureInput }, ({ actor, params, input }) => eraseImages(actor, params.id, input));
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
