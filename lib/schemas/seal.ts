import { z } from "zod";
import { KEY_PURPOSES } from "@/lib/core/words";
import { prose } from "./text";

/** The three files of a seal that an auditor checks with tools of their own. */
export const SEAL_FILES = ["text", "signature", "key"] as const;
export type SealFile = (typeof SEAL_FILES)[number];

export const keyChangeInput = z.strictObject({
  purpose: z.enum(KEY_PURPOSES, { error: "Say which key: log or seal." }),
  reason: prose(500, "why the key is changed", 3),
});
export type KeyChangeInput = z.infer<typeof keyChangeInput>;

const number = z.coerce.number().int("Give a seal's number.").min(1, "Seals count from 1.").max(4_294_967_295, "There is no such seal.");

export const sealFileInput = z.object({ file: z.enum(SEAL_FILES, { error: "Ask for text, signature or key." }).optional() });
export const proofInput = z.object({ seal: number.optional() });
export const sealListInput = z.object({
  page: z.coerce.number().int().min(1).max(100_000).default(1),
  pageSize: z.coerce.number().int().min(1).max(200).default(25),
});
