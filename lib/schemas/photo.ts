import { z } from "zod";
import { REDUCED_EDGES } from "@/lib/core/photo-kind";

const [LARGE, SMALL] = REDUCED_EDGES;

/** `?reduced` or `?reduced=1600` for the page's copy, `?reduced=400` for the list's; the original when left out. */
export const photoInput = z.object({
  reduced: z.enum(["", String(LARGE), String(SMALL)], { error: `Ask for ${LARGE} or ${SMALL} pixels.` }).transform((text) => (text === String(SMALL) ? SMALL : LARGE)).optional(),
});
