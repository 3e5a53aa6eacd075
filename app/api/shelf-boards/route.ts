import { recordShelfBoard } from "@/lib/commands/record-shelf-board";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { CSV_TYPE } from "@/lib/queries/csv";
import { shelfList } from "@/lib/queries/shelf";
import { shelfFile } from "@/lib/queries/shelf-file";
import { shelfInput, shelfListInput } from "@/lib/schemas/shelf";

export const GET = handler({ input: shelfListInput }, async ({ actor, input }) => {
  if (input.format === "json") return shelfList(actor, input);
  const { fileName, stream } = await shelfFile(actor, input);
  return new Response(stream, { headers: { "content-type": CSV_TYPE, "content-disposition": `attachment; filename="${fileName}"` } });
});
export const POST = handler({ input: shelfInput, status: 201 }, ({ actor, input }) => recordShelfBoard(actor, input));
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
