import { askForSeal } from "@/lib/commands/ask-for-seal";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { sealList } from "@/lib/queries/seals";
import { sealListInput } from "@/lib/schemas/seal";

export const GET = handler({ input: sealListInput }, ({ actor, input }) => sealList(actor, input));
export const POST = handler({ status: 201 }, ({ actor }) => askForSeal(actor));
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
