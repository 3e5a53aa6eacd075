import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { custodyOfDrive } from "@/lib/queries/custody";

export const GET = handler({}, ({ actor, params }) => custodyOfDrive(actor, params.id));
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
