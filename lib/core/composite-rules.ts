import type { Vote } from "./composite-vote";
import { countOf, withCommas } from "./quantity";
import type { Severity } from "./words";

/** Why no composite is made. Each is a rule of trade/MAJORITY.md D.1. */
export type CompositeRefusalCode =
  | "too-few" | "one-seating" | "different-size" | "agreeing-reads" | "families" | "too-many-disputed" | "ties";

/** The sentence says what stands against the vote and what to do instead. */
export class CompositeRefusal extends Error {
  constructor(readonly code: CompositeRefusalCode, message: string) {
    super(message);
    this.name = "CompositeRefusal";
  }
}

export const LEAST_READS = 3;
export const LEAST_SEATINGS = 2;
/** Largest share of disputed bytes: above it the difference is no longer local. */
export const MOST_DISPUTED = 0.01;

/** F01–F15, F20, F21, F24–F28 and whatever shows that a read is not this chip's content, place by place. */
const GLOBAL_FAULTS: Record<string, string> = {
  "blank": "it is blank", "all-zero": "it is all 00", "constant": "it holds one value throughout",
  "repeats-within": "it repeats itself", "address-line": "an address line looks stuck in it", "short-period": "it repeats a few bytes",
  "too-short": "it is too short", "padded": "it is too long", "extra-bytes": "it is too long", "different-length": "it has another length",
  "bit-slip": "it is shifted by bits", "byte-slip": "it is shifted by bytes", "command-echo": "it is shifted behind an echoed command",
  "rotated": "it begins at another address", "byte-swapped": "its bytes are swapped", "bit-reversed": "its bits are reversed",
  "inverted": "it is inverted", "rearranged": "its bytes are rearranged", "foreign-blocks": "it holds foreign blocks",
  "text-file": "it is a text file", "container-file": "it is an archive or document", "other-chip": "it equals another chip's image",
  "other-drive": "it equals another drive's image", "donor-content": "it equals a donor's own content",
};

/**
 * Why a read may not vote, or null. `findings`: the read's own (only those that block count, as a repeat may be real);
 * `diagnoses`: codes of comparisons in which this read is the one that is off.
 */
export function voteExclusion(findings: readonly { code: string; severity: Severity }[], diagnoses: readonly string[] = []): string | null {
  const codes = [...findings.filter((one) => one.severity === "blocks").map((one) => one.code), ...diagnoses];
  const hit = codes.find((code) => Object.hasOwn(GLOBAL_FAULTS, code));
  return hit === undefined ? null : `${GLOBAL_FAULTS[hit]} (${hit})`;
}

interface Voter {
  sha256: string;
  seating: number;
  bytes: Uint8Array;
}

/** The rules that can be asked before voting. Throws CompositeRefusal. */
export function checkVoters(voters: readonly Voter[], excluded: number): void {
  const beside = excluded > 0 ? ` (${countOf(excluded, "read")} may not vote)` : "";
  if (voters.length < LEAST_READS) {
    throw new CompositeRefusal("too-few", `A composite needs ${LEAST_READS} reads that may vote; there are ${voters.length}${beside}. Take more reads.`);
  }
  const sizes = [...new Set(voters.map((one) => one.bytes.length))].sort((a, b) => a - b);
  if (sizes.length > 1 || sizes[0] === 0) {
    throw new CompositeRefusal("different-size", `The reads have different lengths (${sizes.map(withCommas).join(", ")} bytes). Choose reads of the chip's own size.`);
  }
  const groups = new Map<string, number>();
  for (const { sha256 } of voters) groups.set(sha256, (groups.get(sha256) ?? 0) + 1);
  const families = [...groups.values()].filter((n) => n >= 2);
  if (families.length >= 2) {
    throw new CompositeRefusal("families", `The reads fall into ${families.length} groups that are each equal inside: that is another state or another fault, not noise. Find out what differs between the groups and read again.`);
  }
  if (families.some((n) => n >= 3)) {
    throw new CompositeRefusal("agreeing-reads", `${families[0]} of these reads are equal, and equal reads beat a vote. Set the others aside with a reason and approve that image.`);
  }
  if (new Set(voters.map((one) => one.seating)).size < LEAST_SEATINGS) {
    throw new CompositeRefusal("one-seating", "All these reads come from one seating, and a clip that sits wrong gives the same wrong bits each time. Re-seat it and read again.");
  }
}

/** The rules that need the vote. Throws CompositeRefusal. */
export function checkVote(vote: Vote, voters: number): void {
  const share = vote.disputedBytes / vote.bytes.length;
  if (share > MOST_DISPUTED) {
    const percent = (Math.ceil(share * 10_000) / 100).toFixed(2);
    throw new CompositeRefusal("too-many-disputed", `The reads differ in ${countOf(vote.disputedBytes, "byte")}, ${percent} % of the image; above 1 % it is no longer a few unsure bits. Lower the clock, re-seat the clip and read again.`);
  }
  if (vote.counts.undecided > 0) {
    throw new CompositeRefusal("ties", `${countOf(vote.counts.undecided, "byte")} ${vote.counts.undecided === 1 ? "has" : "have"} as many votes for as against among ${voters} reads. Take one more read: no value is chosen without a majority.`);
  }
}
