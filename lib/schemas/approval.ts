import { z } from "zod";
import { TRANSFER_KINDS } from "@/lib/core/words";
import { line, maybe, prose, uuid } from "./text";

export const approvalRequestInput = z.strictObject({ message: maybe(prose(2000, "a message")).optional() });
export type ApprovalRequestInput = z.infer<typeof approvalRequestInput>;

export const approvalInput = z.strictObject({
  sha256: z.string().regex(/^[0-9a-fA-F]{64}$/, "A SHA-256 has 64 hex digits.").transform((s) => s.toLowerCase()),
  donorChipId: uuid,
  statement: prose(4000, "the reason for your approval", 3),
  reasons: z.record(z.string().max(40), prose(2000, "a reason")).default({}),
  lookedAt: z.array(z.string().max(80)).max(200).default([]),
  code: maybe(z.string().regex(/^\d{6}$/, "The code has 6 digits.")).optional(),
});
export type ApprovalInput = z.infer<typeof approvalInput>;

export const transferInput = z.strictObject({
  kind: z.enum(TRANSFER_KINDS, "Say write or chip-moved."),
  donorChipId: uuid,
  programmer: maybe(line(120, "the programmer")).optional(),
  toolVersion: maybe(line(120, "the tool version")).optional(),
  adapter: maybe(line(120, "the adapter")).optional(),
  note: maybe(prose(4000, "a note")).optional(),
});
export type TransferInput = z.infer<typeof transferInput>;
