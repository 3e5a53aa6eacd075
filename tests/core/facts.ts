import type { ApprovalFacts } from "@/lib/core/approval";
import type { StateFacts, StateRead } from "@/lib/core/chip-state";
import { DEFAULT_POLICY, type Finding, type FindingCode, type Severity } from "@/lib/core/words";

/** Digests that are told apart at a glance. */
export const GOOD = "a".repeat(64);
export const OTHER = "b".repeat(64);
export const DONOR = "d".repeat(64);
export const SIZE = 8192;

export function found(code: FindingCode, severity: Severity): Finding {
  return { code, severity, message: `Found ${code}.`, advice: "Do this." };
}

let count = 0;

export function read(over: Partial<StateRead> = {}): StateRead {
  count += 1;
  return { id: `read-${count}`, number: 1, stage: "before", seating: 1, sha256: GOOD, sizeBytes: SIZE, counted: true, findings: [], operatorId: "mira", ...over };
}

/** Three agreeing reads in two seatings. */
export const agreed = (over: Partial<StateRead> = {}) =>
  [1, 2, 3].map((number) => read({ number, seating: number === 3 ? 2 : 1, ...over }));

export const back = (number: number, over: Partial<StateRead> = {}) => read({ number, stage: "after", seating: number, ...over });
export const own = (number: number, over: Partial<StateRead> = {}) => read({ number, stage: "donor", sha256: DONOR, ...over });

export const APPROVAL = { sha256: GOOD, donorChipId: "donor-chip" };

export function facts(over: Partial<StateFacts> = {}): StateFacts {
  return { policy: DEFAULT_POLICY, sizeBytes: SIZE, reads: agreed(), approval: null, transfer: null, ...over };
}

export function transfer(over: Partial<NonNullable<StateFacts["transfer"]>> = {}): NonNullable<StateFacts["transfer"]> {
  return { approvedSha256: GOOD, approvalStands: true, poweredOn: false, readBacks: [], ...over };
}

export function approvalFacts(over: Partial<ApprovalFacts> = {}): ApprovalFacts {
  return {
    ...facts(), chainClean: true, takers: ["mira"], imageSound: true,
    donor: { chipId: "donor-chip", sizeBytes: SIZE, savedReads: [own(1), own(2)], firstTransferDone: false }, ...over,
  };
}
