import { withdrawRequest } from "@/lib/commands/withdraw-request";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { withdrawalInput } from "@/lib/schemas/request";

// `secret`: the link's secret is kept under no Idempotency-Key; withdrawing a second time is refused anyway
export const POST = handler({ input: withdrawalInput, open: "anyone", secret: true }, async ({ input }) => {
  await withdrawRequest(input.token);
  return {};
});
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
