import { renewRequestLink } from "@/lib/commands/renew-request-link";
import { withdrawRequestLink } from "@/lib/commands/withdraw-request-link";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";

export const POST = handler({}, async ({ actor, params }) => {
  await renewRequestLink(actor, params.id);
  return {};
});
export const DELETE = handler({}, async ({ actor, params }) => {
  await withdrawRequestLink(actor, params.id);
  return {};
});
export const { GET, PUT, PATCH, OPTIONS } = othersThan("POST", "DELETE");
