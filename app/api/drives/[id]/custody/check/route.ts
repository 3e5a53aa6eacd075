import { handler } from "@/lib/http/handler";
import { custodyCheckOfDrive } from "@/lib/queries/custody";

export const GET = handler({}, ({ actor, params }) => custodyCheckOfDrive(actor, params.id));
