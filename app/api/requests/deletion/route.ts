import { askDeletion } from "@/lib/commands/ask-deletion";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { deletionInput } from "@/lib/schemas/request";

// `secret`: the link's secret is kept under no Idempotency-Key; asking a second time is refused anyway
export const POST = handler({ input: deletionInput, open: "anyone", secret: true }, async ({ input }) => {
  await askDeletion(input.token, input.message ?? null);
  return {};
});
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
