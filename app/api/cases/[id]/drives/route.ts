import { recordDrive } from "@/lib/commands/record-drive";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { driveInput } from "@/lib/schemas/drive";

export const POST = handler({ input: driveInput, status: 201 }, ({ actor, params, input }) => recordDrive(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
