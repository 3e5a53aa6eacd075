import { handler } from "@/lib/http/handler";
import { health } from "@/lib/queries/health";

export const GET = handler({ open: "anyone" }, () => health());
