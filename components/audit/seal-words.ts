import type { SealCause } from "@/lib/core/words";

/** Why a seal was made. */
export const CAUSE: Record<SealCause, string> = { daily: "of the day", bundle: "before a bundle", summary: "before a summary", asked: "asked for" };
