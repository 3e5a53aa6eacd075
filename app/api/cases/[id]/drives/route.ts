import { recordDrive } from "@/lib/commands/record-drive";
import { handler } from "@/lib/http/handler";
import { driveInput } from "@/lib/schemas/drive";

export const POST = handler({ input: driveInput, status: 201 }, ({ actor, params, input }) => recordDrive(actor, params.id, input));
