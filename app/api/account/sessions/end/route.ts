import { endOtherSessions } from "@/lib/commands/change-password";
import { sessionId } from "@/lib/auth/actor";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";

export const POST = handler({}, async ({ actor }) => endOtherSessions(actor, await sessionId()));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
