import { othersThan } from "@/lib/http/others-than";
import { photoList, photoUpload } from "@/lib/http/photo-upload";

export const GET = photoList("shelf-board");
export const POST = photoUpload("shelf-board");
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
