import type { ApprovalRequestView, ApprovalView, TransferView } from "@/lib/views";
import type { Approval, ApprovalRequest, Transfer } from "@/models";
import type { People } from "./people";

export function approvalView(row: Approval, who: People): ApprovalView {
  return {
    id: row.id, sha256: row.sha256.toString("hex"), donorChipId: row.donorChipId, approvedBy: who(row.approvedBy), givenAt: row.givenAt.toISOString(),
    statement: row.statement, reasons: JSON.parse(row.reasons) as Record<string, string>, twoPersonRule: row.twoPersonRule,
    revoked: row.revokedAt ? { at: row.revokedAt.toISOString(), by: who(row.revokedBy ?? null), cause: row.revokedCause ?? "", reason: row.revokedReason ?? "" } : null,
  };
}

export function transferView(row: Transfer, who: People): TransferView {
  return {
    id: row.id, approvalId: row.approvalId, kind: row.kind, donorChipId: row.donorChipId, programmer: row.programmer ?? null,
    toolVersion: row.toolVersion ?? null, adapter: row.adapter ?? null, note: row.note ?? null, by: who(row.byUserId), at: row.at.toISOString(),
  };
}

export function requestView(row: ApprovalRequest, who: People): ApprovalRequestView {
  return {
    id: row.id, askedBy: who(row.askedBy), askedAt: row.askedAt.toISOString(), message: row.message ?? null,
    sentBack: row.sentBackAt ? { by: who(row.sentBackBy ?? null), at: row.sentBackAt.toISOString(), reason: row.sentBackReason ?? "" } : null,
  };
}
