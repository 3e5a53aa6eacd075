import { z } from "zod";
import { compositeInput } from "@/lib/schemas/read";

/** Ticks of one name come as a list of texts, or as one text or false when there is but one. */
const ticked = z.preprocess((value) => (Array.isArray(value) ? value : typeof value === "string" ? [value] : []).map(Number), compositeInput.shape.reads);

export const compositeForm = z.strictObject({ reads: ticked, reason: compositeInput.shape.reason });
export type CompositeFormInput = z.input<typeof compositeForm>;
export type CompositeFormOutput = z.output<typeof compositeForm>;
