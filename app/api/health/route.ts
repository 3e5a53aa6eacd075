import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { health } from "@/lib/queries/health";

export const GET = handler({ open: "anyone" }, () => health());
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
