import { nowhere } from "@/lib/http/nowhere";

export { nowhere as GET, nowhere as POST, nowhere as PUT, nowhere as PATCH, nowhere as DELETE };
