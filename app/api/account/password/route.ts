import { changePassword, endOtherSessions } from "@/lib/commands/change-password";
import { sessionId } from "@/lib/auth/actor";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { passwordInput } from "@/lib/schemas/user";

export const POST = handler({ input: passwordInput, open: "new-password", secret: true }, async ({ actor, input }) => {
  const done = await changePassword(actor, input);
  await endOtherSessions(actor, await sessionId());
  return done;
});
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
