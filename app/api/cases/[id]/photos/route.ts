import { othersThan } from "@/lib/http/others-than";
import { photoList, photoUpload } from "@/lib/http/photo-upload";

export const GET = photoList("case");
export const POST = photoUpload("case");
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
