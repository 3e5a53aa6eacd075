import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { custodyCheckOfDrive } from "@/lib/queries/custody";

export const GET = handler({}, ({ actor, params }) => custodyCheckOfDrive(actor, params.id));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
