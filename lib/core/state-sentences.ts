import type { AgreementGroup, StateRead } from "./agreement";
import type { OpenFinding, WorstDifference } from "./chip-state";
import { countOf, listText, readsText } from "./quantity";
import { placeText } from "./strip";
import { readName, type Policy } from "./words";

/** What was found, then what to do next: one for each line of PRODUCT.md's table. */

const inSeatings = (n: number) => (n > 1 ? ` in ${n} seatings` : "");

/** `started`: the board has been started on the drive since. `closed`: there is nothing left to do. */
export function verifiedSentence(equal: number, sizeBytes: number, started: boolean, closed = false): string {
  const all = equal === 1 ? "The read-back equals" : equal === 2 ? "Both read-backs equal" : `All ${equal} read-backs equal`;
  const found = `${all} the approved image in all ${countOf(sizeBytes, "byte")}.`;
  if (closed) return found;
  return `${found} ${started ? "Pack the donor board with the drive." : "Fit the donor board to the drive and test its start-up."}`;
}

export function failedSentence(approvalStands: boolean, against: StateRead | null, clearedAnew: boolean): string {
  if (!approvalStands) {
    const next = clearedAnew ? "Write the image that is cleared now, then read it back." : "Have an image approved, then write again.";
    return `The donor holds an image that is no longer cleared. ${next}`;
  }
  const name = against ? readName("after", against.number) : "A read-back";
  const finding = against?.findings.find((one) => one.severity === "blocks" && one.code !== "verified");
  if (!finding) return `${name} differs from the approved image. Write again, then read back.`;
  return `${name}: ${finding.message} ${finding.advice}`;
}

export function writtenSentence(policy: Policy, equal: number, seatings: number): string {
  if (equal === 0) return `Written, not read back yet. Take ${countOf(policy.readBacks, "read-back")}${inSeatings(policy.readBackSeatings)}.`;
  const again = seatings < policy.readBackSeatings ? "read back again in a new seating" : "read back again";
  return `${equal} of ${policy.readBacks} read-backs, ${seatings} of ${policy.readBackSeatings} seatings: ${again}.`;
}

export function approvedSentence(policy: Policy): string {
  return `The image is cleared. Write it to the donor chip or move the chip, then take ${countOf(policy.readBacks, "read-back")}.`;
}

export function unreadSentence(policy: Policy, setAside: number): string {
  const found = setAside > 0 ? "Every read is set aside." : "Nothing read yet.";
  return `${found} Take ${countOf(policy.reads, "read")}${inSeatings(policy.seatings)}.`;
}

export function disagreeSentence(groups: readonly AgreementGroup[], odd: number | null, worst: WorstDifference | null, sizeBytes: number): string {
  const next = worst?.advice ?? "Re-seat the clip and read again.";
  if (worst) {
    const who = odd === worst.oddRead ? `Read ${odd} differs` : `${readsText([worst.oddRead, worst.otherRead].sort((a, b) => a - b))} differ`;
    const guess = worst.looksLike ? `: looks like ${worst.looksLike}` : "";
    return `${who} in ${countOf(worst.differingBytes, "byte")}, ${placeText(worst.first, worst.last, sizeBytes)}${guess}. ${next}`;
  }
  if (odd !== null && groups.length === 2 && groups[1].reads.length === 1) {
    return `Read ${odd} differs from ${readsText(groups[0].reads)}. ${next}`;
  }
  return `${listText(groups.map((group) => readsText(group.reads)))} differ. ${next}`;
}

/** The first finding in full, and how many more there are. */
export function heldSentence(open: readonly OpenFinding[], blocks: boolean): string {
  const { read, finding } = open[0];
  const who = read === null ? "" : `Read ${read}: `;
  const others = new Set(open.map((one) => `${one.finding.code} ${one.finding.message}`)).size - 1;
  const more = others > 0 ? ` ${countOf(others, "more finding")} ${others === 1 ? "stands" : "stand"} against it.` : "";
  const ways = blocks ? "" : " A lead may approve with a written reason.";
  return `${who}${finding.message} ${finding.advice}${more}${ways}`;
}

export function needsReadsSentence(policy: Policy, agreeing: number, seatings: number): string {
  const again = seatings < policy.seatings ? "read again in a new seating" : "read again";
  return `${agreeing} of ${policy.reads} reads, ${seatings} of ${policy.seatings} seatings: ${again}.`;
}

/** `donor`: what is still to be done on the donor's side before anyone can approve. `asked`: a lead was asked and has not answered. */
export function readySentence(agreeing: number, seatings: number, twoPersonRule: boolean, donor: "none" | "unsaved" | "saved" = "saved", asked = false): string {
  const who = twoPersonRule ? "a lead who took none of them" : "a lead";
  const agree = `${agreeing} of ${agreeing} reads agree${inSeatings(seatings)}`;
  if (donor === "none") return `${agree}. Record the donor’s chip that is to take the image and save what it holds, then ask ${who} to approve.`;
  if (donor === "unsaved") return `${agree}. Save the donor chip’s own content by two equal reads, then ask ${who} to approve.`;
  return `${agree}; nothing stands against approval. ${asked ? `Approval was asked for: ${who} signs or sends it back.` : `Ask ${who} to approve.`}`;
}

/** The reads agree and no image is to be written from them. */
export const keptSentence = (agreeing: number, seatings: number): string => `${agreeing} of ${agreeing} reads agree${inSeatings(seatings)}. Kept for reference: nothing is to be written.`;
