import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { differencesCsv } from "@/lib/queries/compare";
import { comparedInput } from "@/lib/schemas/read";

export const GET = handler({ input: comparedInput }, async ({ actor, params, input }) => {
  const { text, fileName } = await differencesCsv(actor, params.id, input);
  return new Response(text, { headers: { "content-type": "text/csv; charset=utf-8; header=present", "content-disposition": `attachment; filename="${fileName}"` } });
});
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
