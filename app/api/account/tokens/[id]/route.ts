import { withdrawBenchToken } from "@/lib/commands/create-bench-token";
import { handler } from "@/lib/http/handler";

export const DELETE = handler({}, ({ actor, params }) => withdrawBenchToken(actor, params.id));
