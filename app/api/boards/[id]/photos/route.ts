import { othersThan } from "@/lib/http/others-than";
import { photoList, photoUpload } from "@/lib/http/photo-upload";

export const GET = photoList("board");
export const POST = photoUpload("board");
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
