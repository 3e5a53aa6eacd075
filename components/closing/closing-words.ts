import type { ClosedKind } from "@/lib/core/words";

export const KIND_WORDS: Record<ClosedKind, { label: string; means: string }> = {
  returned: { label: "Returned", means: "The work is done and everything went back." },
  "without-transfer": { label: "Ended without a transfer", means: "No image was moved, or none that could be verified." },
  cancelled: { label: "Cancelled", means: "The customer or the workshop called it off." },
};
