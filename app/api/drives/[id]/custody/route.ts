import { handler } from "@/lib/http/handler";
import { custodyOfDrive } from "@/lib/queries/custody";

export const GET = handler({}, ({ actor, params }) => custodyOfDrive(actor, params.id));
