import { endOtherSessions } from "@/lib/commands/change-password";
import { sessionId } from "@/lib/auth/actor";
import { handler } from "@/lib/http/handler";

export const POST = handler({}, async ({ actor }) => endOtherSessions(actor, await sessionId()));
