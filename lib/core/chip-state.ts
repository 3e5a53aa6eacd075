import { agreement, oddOneOut, type StateRead } from "./agreement";
import { oneSeatingFinding } from "./findings";
import {
  approvedSentence, disagreeSentence, failedSentence, heldSentence, keptSentence, needsReadsSentence, readySentence, unreadSentence,
  verifiedSentence, writtenSentence,
} from "./state-sentences";
import type { ChipStateCode, Finding, Policy } from "./words";

export { agreement, oddOneOut, type AgreementGroup, type StateRead } from "./agreement";

/** Comparison detail for the sentence on reads that disagree, when known. Addresses in bytes. */
export interface WorstDifference {
  oddRead: number;
  otherRead: number;
  differingBytes: number;
  first: number;
  last: number;
  looksLike: string | null;
  /** what to do next, where the cause says more than "read again" */
  advice?: string;
}

export interface StateTransfer {
  approvedSha256: string;
  approvalStands: boolean;
  /** the board has been started on the drive */
  poweredOn: boolean;
  readBacks: StateRead[];
}

export interface StateFacts {
  policy: Policy;
  /** of the original's chip */
  sizeBytes: number;
  /** `before` reads, set aside ones too */
  reads: StateRead[];
  /** the standing approval */
  approval: { sha256: string; donorChipId: string } | null;
  /** the latest transfer */
  transfer: StateTransfer | null;
  worst?: WorstDifference | null;
  /** the donor's side of an approval, where it is known */
  donorSide?: "none" | "unsaved" | "saved";
  /** a lead was asked to approve and has neither signed nor sent it back */
  asked?: boolean;
  /** the chip is kept for reference: no transfer is planned */
  kept?: boolean;
  /** the case is closed */
  closed?: boolean;
}

export interface DerivedState {
  state: ChipStateCode;
  label: string;
  sentence: string;
}

export const STATE_LABEL: Record<ChipStateCode, string> = {
  verified: "Verified",
  failed: "Write again",
  written: "To read back",
  approved: "Cleared to write",
  unread: "To read",
  "reads-disagree": "Reads disagree",
  held: "Something stands against it",
  "needs-reads": "To read",
  ready: "Waiting for approval",
};

/** The bench in its order (DESIGN.md section 7). What is to be received has no chip yet. */
export const BENCH_GROUPS: readonly { key: string; label: string; states: readonly ChipStateCode[] }[] = [
  { key: "to-read", label: "To read", states: ["unread", "needs-reads"] },
  { key: "reads-disagree", label: "Reads disagree", states: ["reads-disagree"] },
  { key: "held", label: "Something stands against it", states: ["held"] },
  { key: "ready", label: "Waiting for approval", states: ["ready"] },
  { key: "approved", label: "Cleared to write", states: ["approved"] },
  { key: "written", label: "To read back", states: ["written"] },
  { key: "failed", label: "Write again", states: ["failed"] },
  { key: "verified", label: "To return", states: ["verified"] },
];

export function benchGroupOf(state: ChipStateCode): string {
  return BENCH_GROUPS.find((group) => group.states.includes(state))?.key ?? "to-read";
}

export interface OpenFinding {
  /** null for a finding on the chip */
  read: number | null;
  finding: Finding;
}

/** Findings of severity `blocks` or `reason` on counted `before` reads, and on the chip; blocks first. */
export function openFindings({ policy, reads }: Pick<StateFacts, "policy" | "reads">): OpenFinding[] {
  const counted = reads.filter((read) => read.counted && read.stage === "before");
  const oneSeating = oneSeatingFinding(policy, counted);
  const all: OpenFinding[] = [
    ...counted.flatMap((read) => read.findings.map((finding) => ({ read: read.number, finding }))),
    ...(oneSeating ? [{ read: null, finding: oneSeating }] : []),
  ];
  return [...all.filter((open) => open.finding.severity === "blocks"), ...all.filter((open) => open.finding.severity === "reason")];
}

/**
 * A counted read-back that differs stands against the write. After the first power-on it is a note, unless it was
 * judged before that (it then still carries its `blocks`).
 */
function standsAgainst(read: StateRead, transfer: StateTransfer): boolean {
  if (!read.counted || read.sha256 === transfer.approvedSha256) return false;
  return !transfer.poweredOn || read.findings.some((finding) => finding.severity === "blocks");
}

function transferState({ policy, sizeBytes, closed }: StateFacts, transfer: StateTransfer, clearedAnew: boolean): { state: ChipStateCode; sentence: string } {
  const against = transfer.readBacks.find((read) => standsAgainst(read, transfer)) ?? null;
  if (!transfer.approvalStands || against) {
    return { state: "failed", sentence: failedSentence(transfer.approvalStands, against, clearedAnew) };
  }
  const equal = transfer.readBacks.filter((read) => read.counted && read.sha256 === transfer.approvedSha256);
  const seatings = new Set(equal.map((read) => read.seating)).size;
  if (equal.length >= policy.readBacks && seatings >= policy.readBackSeatings) {
    return { state: "verified", sentence: verifiedSentence(equal.length, sizeBytes, transfer.poweredOn, closed) };
  }
  return { state: "written", sentence: writtenSentence(policy, equal.length, seatings) };
}

/** The lines from `unread` on: what the reads alone say. An approval is judged by these. */
export function deriveReadingState(facts: Pick<StateFacts, "policy" | "sizeBytes" | "reads" | "worst" | "donorSide" | "asked" | "kept">): DerivedState {
  const { policy, sizeBytes } = facts;
  const reads = facts.reads.filter((read) => read.stage === "before");
  const say = (state: ChipStateCode, sentence: string): DerivedState => ({ state, label: STATE_LABEL[state], sentence });
  const { groups, largest } = agreement(reads);
  if (!largest) return say("unread", unreadSentence(policy, reads.length));
  if (groups.length > 1) return say("reads-disagree", disagreeSentence(groups, oddOneOut(reads), facts.worst ?? null, sizeBytes));
  const open = openFindings({ policy, reads });
  const blocks = open.filter(({ finding }) => finding.severity === "blocks");
  if (blocks.length > 0) return say("held", heldSentence(blocks, true));
  const [agreeing, seatings] = [largest.behind, largest.seatings.length];
  if (agreeing < policy.reads || seatings < policy.seatings) {
    return say("needs-reads", needsReadsSentence(policy, agreeing, seatings));
  }
  if (open.length > 0) return say("held", heldSentence(open, false));
  return say("ready", facts.kept ? keptSentence(agreeing, seatings) : readySentence(agreeing, seatings, policy.twoPersonRule, facts.donorSide, facts.asked));
}

/** The state of an original's chip: PRODUCT.md's table, the first line that applies. Nothing types it in. */
export function deriveChipState(facts: StateFacts): DerivedState {
  const { policy, transfer, approval } = facts;
  if (transfer) {
    const { state, sentence } = transferState(facts, transfer, approval !== null);
    return { state, label: STATE_LABEL[state], sentence };
  }
  if (approval) return { state: "approved", label: STATE_LABEL.approved, sentence: approvedSentence(policy) };
  return deriveReadingState(facts);
}
