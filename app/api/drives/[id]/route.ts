import { correctDrive } from "@/lib/commands/correct-drive";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { driveView } from "@/lib/queries/drives";
import { driveCorrection } from "@/lib/schemas/drive";

export const GET = handler({}, ({ actor, params }) => driveView(actor, params.id));
export const PATCH = handler({ input: driveCorrection }, ({ actor, params, input }) => correctDrive(actor, params.id, input));
export const { POST, PUT, DELETE, OPTIONS } = othersThan("GET", "PATCH");
