import { othersThan } from "@/lib/http/others-than";
import { photoList, photoUpload } from "@/lib/http/photo-upload";

export const GET = photoList("drive");
export const POST = photoUpload("drive");
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
