import { othersThan } from "@/lib/http/others-than";
import { requestHandler } from "@/lib/http/request-handler";

export const POST = requestHandler();
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
