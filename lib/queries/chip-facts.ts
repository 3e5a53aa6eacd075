import type { ApprovalFacts } from "@/lib/core/approval";
import { donorSaved } from "@/lib/core/approval";
import type { StateFacts, StateRead } from "@/lib/core/chip-state";
import type { Finding, Policy } from "@/lib/core/words";
import { derivedFacts } from "@/lib/core/derived";
import type { Read } from "@/models";
import type { ChipRecord } from "./chip-records";

/** From rows to the plain facts that the rules of lib/core ask for. */
export function stateRead(row: Read): StateRead {
  const derived = derivedFacts(row);
  return {
    id: row.id, number: row.number, stage: row.stage, seating: row.seating, sha256: row.sha256.toString("hex"), sizeBytes: row.sizeBytes,
    counted: row.counted, findings: JSON.parse(row.findings) as Finding[], operatorId: row.operatorId,
    ...(derived ? { voters: { reads: derived.voters.length, seatings: [...new Set(derived.voters.map((v) => v.seating))] } } : {}),
  };
}

export function stateFacts(record: ChipRecord, policy: Policy, worst: StateFacts["worst"] = null): StateFacts {
  const latest = record.transfers.at(-1);
  const behind = latest && record.approvals.find((a) => a.id === latest.approvalId);
  return {
    policy, sizeBytes: record.chip.sizeBytes, reads: record.before.map(stateRead), worst, donorSide: record.donor === null ? "none" : donorContentSaved(record) ? "saved" : "unsaved",
    asked: record.request !== null && !record.request.sentBackAt, kept: !record.chip.needsTransfer, closed: Boolean(record.case.closedAt),
    approval: record.standing && { sha256: record.standing.sha256.toString("hex"), donorChipId: record.standing.donorChipId },
    transfer: latest && behind ? {
      approvedSha256: behind.sha256.toString("hex"), approvalStands: !behind.revokedAt, poweredOn: record.started.some((at) => at > latest.at),
      readBacks: record.backs.filter((r) => r.transferId === latest.id).map(stateRead),
    } : null,
  };
}

export function approvalFacts(record: ChipRecord, policy: Policy, chainClean: boolean): ApprovalFacts {
  const counted = record.before.filter((r) => r.counted);
  return {
    ...stateFacts(record, policy),
    donor: record.donor && {
      chipId: record.donor.chip.id, sizeBytes: record.donor.chip.sizeBytes, savedReads: soundOwn(record),
      firstTransferDone: record.transfers.some((t) => t.donorChipId === record.donor!.chip.id),
    },
    chainClean,
    takers: [...new Set(record.before.map((r) => r.operatorId))],
    imageSound: counted.every((r) => !record.unsound.has(r.sha256.toString("hex"))),
  };
}

/** A donor's read whose stored image is damaged or missing saves nothing. */
function soundOwn(record: ChipRecord): StateRead[] {
  return record.own.filter((r) => !record.unsound.has(r.sha256.toString("hex"))).map(stateRead);
}

export function donorContentSaved(record: ChipRecord): boolean {
  return record.donor !== null && donorSaved(soundOwn(record), record.donor.chip.sizeBytes);
}
