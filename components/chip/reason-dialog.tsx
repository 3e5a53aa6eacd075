import { whenAsked } from "@/components/ui/when-asked";

/** Asks for a reason, then does it. Mount it only while it is open. */
export const ReasonDialog = whenAsked(() => import("./reason-form").then((m) => m.ReasonForm));
