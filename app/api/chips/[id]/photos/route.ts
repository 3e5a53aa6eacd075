import { photoRoute } from "@/lib/http/photo-upload";

export const { GET, POST, PUT, PATCH, DELETE, OPTIONS } = photoRoute("chip");
