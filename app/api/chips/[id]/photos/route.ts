import { othersThan } from "@/lib/http/others-than";
import { photoList, photoUpload } from "@/lib/http/photo-upload";

export const GET = photoList("chip");
export const POST = photoUpload("chip");
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
