import { withdrawBenchToken } from "@/lib/commands/create-bench-token";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";

export const DELETE = handler({}, ({ actor, params }) => withdrawBenchToken(actor, params.id));
export const { GET, POST, PUT, PATCH, OPTIONS } = othersThan("DELETE");
