import { z } from "zod";
import { noteOpened } from "@/lib/commands/note-opened";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";

// `secret`: the link's secret is kept under no Idempotency-Key; a second opening changes nothing anyway
export const POST = handler({ input: z.object({ token: z.string().max(100) }), open: "anyone", secret: true }, async ({ input }) => {
  await noteOpened(input.token);
  return {};
});
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
