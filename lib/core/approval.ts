import { agreement, donorSaved, type AgreementGroup, type StateRead } from "./agreement";
import { deriveReadingState, openFindings, type StateFacts } from "./chip-state";
import { listText, readsText, sizeText } from "./quantity";
import { readName, seatingLetter, type Actor } from "./words";

export { donorSaved } from "./agreement";

/** What an approval is judged by: the chip's state and what surrounds it. */
export interface ApprovalFacts extends StateFacts {
  /** the paired donor chip; `savedReads` are its own `donor` reads, set aside ones too */
  donor: { chipId: string; sizeBytes: number; savedReads: StateRead[]; firstTransferDone: boolean } | null;
  /** the check of the drive's log is clean */
  chainClean: boolean;
  /** operator ids of all `before` reads, set aside or not */
  takers: string[];
  /** the stored image is there and equals its digest */
  imageSound: boolean;
}

/** One line of the approval section. */
export interface Condition {
  key: string;
  rule: string;
  value: string;
  state: "met" | "open" | "against";
}

export interface ApprovalAsked {
  sha256: string;
  donorChipId: string;
  /** a written text for each open finding of severity `reason`, by code */
  reasons?: Record<string, string>;
}

/** Characters that a written reason needs. */
export const REASON_CHARACTERS = 10;

const beforeReads = (facts: StateFacts) => facts.reads.filter((read) => read.stage === "before");

function agreementConditions({ policy }: StateFacts, largest: AgreementGroup | null, alone: boolean): Condition[] {
  const [reads, seatings] = [largest?.reads ?? [], largest?.seatings ?? []];
  const behind = largest?.behind ?? 0;
  const enough = alone && behind >= policy.reads;
  const lettered = seatings.map(seatingLetter);
  return [
    {
      key: "agreeing-reads", rule: `At least ${policy.reads} reads agree byte for byte`,
      value: enough ? (behind > reads.length ? `composite of ${behind}` : listText(reads.map(String))) : `${behind} of ${policy.reads}`, state: enough ? "met" : "open",
    },
    {
      key: "seatings",
      rule: policy.seatings > 1 ? `The agreeing reads come from ${policy.seatings} or more seatings` : "The agreeing reads come from a known seating",
      value: lettered.length > 0 ? lettered.join(", ") : `0 of ${policy.seatings}`, state: seatings.length >= policy.seatings ? "met" : "open",
    },
  ];
}

function readConditions(facts: StateFacts, groups: readonly AgreementGroup[]): Condition[] {
  const counted = beforeReads(facts).filter((read) => read.counted);
  const aside = beforeReads(facts).filter((read) => !read.counted).map((read) => read.number);
  const otherSize = counted.filter((read) => read.sizeBytes !== facts.sizeBytes).map((read) => read.number);
  const odd = groups.slice(1).flatMap((group) => group.reads).sort((a, b) => a - b);
  const open = openFindings(facts);
  const blocks = open.filter(({ finding }) => finding.severity === "blocks").length;
  const checked = counted.length > 0;
  return [
    {
      key: "whole-chip", rule: "Each read is the whole chip",
      value: otherSize.length > 0 ? `${readsText(otherSize)} of another size` : sizeText(facts.sizeBytes),
      state: otherSize.length > 0 ? "against" : checked ? "met" : "open",
    },
    {
      key: "differing-set-aside", rule: "Every read that differs is set aside with a reason",
      value: odd.length > 0 ? `${readsText(odd)} ${odd.length === 1 ? "is" : "are"} open` : aside.length > 0 ? readsText(aside) : "none differs",
      state: odd.length > 0 ? "against" : checked ? "met" : "open",
    },
    {
      key: "findings", rule: "Not blank, not all zeros, of no other chip, no copy",
      value: blocks > 0 ? `${blocks} against` : open.length > 0 ? `${open.length} to be answered in writing` : checked ? "checked" : "nothing read yet",
      state: blocks > 0 ? "against" : open.length > 0 || !checked ? "open" : "met",
    },
  ];
}

function donorConditions({ donor, sizeBytes }: ApprovalFacts): Condition[] {
  const sameSize = donor?.sizeBytes === sizeBytes;
  const saved = donor !== null && donorSaved(donor.savedReads, donor.sizeBytes);
  const own = donor?.savedReads.filter((read) => read.counted && read.stage === "donor") ?? [];
  const disagree = agreement(own).groups.length > 1;
  return [
    {
      key: "donor-paired", rule: "A donor chip of equal size is paired",
      value: donor ? sizeText(donor.sizeBytes) : "none yet", state: !donor ? "open" : sameSize ? "met" : "against",
    },
    {
      key: "donor-saved", rule: "The donor chip’s own content is saved by two equal reads",
      value: saved ? own.map((read) => readName("donor", read.number)).join(", ") : disagree ? "its reads differ" : `${own.length} of 2`,
      state: saved ? "met" : disagree ? "against" : "open",
    },
  ];
}

/** The lines of the chip page's approval section, in its order. The approval opens when none is open or against. */
export function approvalConditions(facts: ApprovalFacts): Condition[] {
  const { groups, largest } = agreement(beforeReads(facts));
  const { twoPersonRule } = facts.policy;
  return [
    ...agreementConditions(facts, largest, groups.length === 1),
    ...readConditions(facts, groups),
    ...donorConditions(facts),
    {
      key: "two-people", rule: "Whoever took a read of the original can’t approve its image",
      value: twoPersonRule ? "two people, always" : "switched off by policy: one person may do both", state: "met",
    },
    { key: "log-clean", rule: "The drive’s custody log checks clean", value: facts.chainClean ? "checked" : "an auditor’s assessment is missing", state: facts.chainClean ? "met" : "against" },
    { key: "image-sound", rule: "The stored images equal their digests", value: facts.imageSound ? "checked" : "damaged, missing or erased", state: facts.imageSound ? "met" : "against" },
  ];
}

function donorRefusal({ donor, sizeBytes }: ApprovalFacts, donorChipId: string): string | null {
  if (!donor) return "No donor chip is paired. Pair one of equal size first.";
  if (donor.chipId !== donorChipId) return "The donor chip is no longer the paired one. Open the chip again and look at its pair.";
  if (donor.sizeBytes !== sizeBytes) {
    return `The donor chip holds ${sizeText(donor.sizeBytes)}, the original ${sizeText(sizeBytes)}. Pair a chip of equal size.`;
  }
  if (!donorSaved(donor.savedReads, donor.sizeBytes)) {
    if (donor.firstTransferDone) return "The donor’s own content was not saved by two equal reads before its first write. Pair another donor chip.";
    return "The donor’s own content isn’t saved yet. Take two equal full-size reads of the donor chip and set aside any that differs.";
  }
  return null;
}

function reasonRefusal(facts: ApprovalFacts, reasons: Record<string, string>): string | null {
  const open = openFindings(facts).filter(({ finding }) => finding.severity === "reason");
  const missing = open.find(({ finding }) => {
    const text = Object.hasOwn(reasons, finding.code) ? reasons[finding.code] : "";
    return text.trim().length < REASON_CHARACTERS;
  });
  if (!missing) return null;
  const who = missing.read === null ? "" : `Read ${missing.read}: `;
  return `${who}${missing.finding.message} Write why it may be approved all the same, in at least ${REASON_CHARACTERS} characters.`;
}

/**
 * The rule that stands against this approval, as a sentence that says what to do, or null when none does. Judged by
 * what the reads say: after a transfer whose approval was revoked, a new approval is the way on.
 */
export function approvalRefusal(facts: ApprovalFacts, actor: Pick<Actor, "id">, input: ApprovalAsked): string | null {
  if (facts.approval || facts.transfer?.approvalStands) return "An approval of this chip stands already. Revoke it before giving another.";
  if (!facts.chainClean) return "The check of this drive’s custody log is not clean. An auditor records an assessment first.";
  const reading = deriveReadingState(facts);
  const blocked = openFindings(facts).some(({ finding }) => finding.severity === "blocks");
  if (reading.state !== "ready" && (reading.state !== "held" || blocked)) return `${reading.label}: ${reading.sentence}`;
  if (agreement(beforeReads(facts)).largest?.sha256 !== input.sha256) {
    return "The agreed image changed meanwhile. Open the chip again and look at its reads.";
  }
  if (!facts.imageSound) return "A stored image of this chip is damaged or missing, or was erased. Set that read aside and read the chip again.";
  const donor = donorRefusal(facts, input.donorChipId);
  if (donor) return donor;
  if (facts.policy.twoPersonRule && facts.takers.includes(actor.id)) {
    return "You took a read of this chip, and whoever took one, set aside or not, can’t approve its image. Ask another lead.";
  }
  return reasonRefusal(facts, input.reasons ?? {});
}
