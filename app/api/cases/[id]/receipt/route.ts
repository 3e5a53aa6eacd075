import { receiveParcel } from "@/lib/commands/receive-parcel";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { receiptInput } from "@/lib/schemas/receipt";

export const POST = handler({ input: receiptInput, status: 201 }, ({ actor, params, input }) => receiveParcel(actor, params.id, input));
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
