import type { Vote } from "./composite-vote";
import { countOf, listText, readsText, withCommas } from "./quantity";
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

/**
 * Which reads are off as a whole, by what the comparisons look like: against more than half of the others there is the
 * same kind of fault, place by place. Where as many are off as are not, nobody can tell which, and none is left out.
 */
export function readsThatAreOff(numbers: readonly number[], pairs: readonly { a: number; b: number; code: string }[]): Map<number, string[]> {
  const faults = pairs.filter((pair) => Object.hasOwn(GLOBAL_FAULTS, pair.code));
  const codesOf = (number: number) => faults.filter((pair) => pair.a === number || pair.b === number).map((pair) => pair.code);
  const off = new Map(numbers.map((number): [number, string[]] => [number, codesOf(number)]).filter(([, codes]) => 2 * codes.length > numbers.length - 1));
  return 2 * off.size < numbers.length ? off : new Map();
}

interface Voter {
  sha256: string;
  seating: number;
  bytes: Uint8Array;
  number?: number;
}

interface LeftOut {
  number: number | null;
  cause: string;
}

/** "it is blank (blank)" without the finding's code. */
export function causeText(cause: string): string {
  return cause.replace(/ \([a-z-]+\)$/, "");
}

/** "Read 2 may not vote because it is blank, and Read 4 because it repeats itself". */
function mayNotVote(excluded: readonly LeftOut[]): string {
  const causes = [...excluded].sort((a, b) => (a.number ?? 0) - (b.number ?? 0)).map(({ number, cause }, i) =>
    `${number === null ? "one read" : readsText([number])} ${i === 0 ? "may not vote " : ""}because ${causeText(cause)}`);
  const text = listText(causes).replace(/ and (?=[^ ]+ \d+ because)/, ", and ");
  return text.charAt(0).toUpperCase() + text.slice(1);
}

function namesOf(voters: readonly Voter[]): string {
  const numbers = voters.flatMap(({ number }) => (number === undefined ? [] : [number])).sort((a, b) => a - b);
  return numbers.length === voters.length ? readsText(numbers) : `${voters.length} of these reads`;
}

function groupedBy<K>(voters: readonly Voter[], key: (one: Voter) => K): [K, Voter[]][] {
  const groups = new Map<K, Voter[]>();
  for (const one of voters) groups.set(key(one), [...(groups.get(key(one)) ?? []), one]);
  return [...groups];
}

/** The rules that can be asked before voting. Throws CompositeRefusal; its sentence names whoever may not vote, and why. */
export function checkVoters(voters: readonly Voter[], excluded: readonly LeftOut[]): void {
  const refuse = (code: CompositeRefusalCode, message: string) => new CompositeRefusal(code, excluded.length > 0 ? `${message} ${mayNotVote(excluded)}.` : message);
  if (voters.length < LEAST_READS) {
    if (excluded.length === 0) throw refuse("too-few", `A composite needs ${LEAST_READS} reads that may vote; there ${voters.length === 1 ? "is" : "are"} ${voters.length}. Take more reads.`);
    const left = voters.length === 0 ? "no read is" : voters.length === 1 ? "only 1 read is" : `only ${voters.length} reads are`;
    throw new CompositeRefusal("too-few", `${mayNotVote(excluded)}, so ${left} left of the ${LEAST_READS} that a composite needs: take more reads.`);
  }
  const sizes = groupedBy(voters, (one) => one.bytes.length).sort(([a], [b]) => a - b);
  if (sizes.length > 1 || sizes[0][0] === 0) {
    const each = sizes.map(([size, ones]) => `${namesOf(ones)} ${ones.length === 1 ? "has" : "have"} ${withCommas(size)}`);
    throw refuse("different-size", `The reads have different lengths in bytes: ${listText(each)}. Choose reads of the chip's own size.`);
  }
  const families = groupedBy(voters, (one) => one.sha256).map(([, ones]) => ones).filter((ones) => ones.length >= 2);
  if (families.length >= 2) {
    throw refuse("families", `${listText(families.map((ones) => `${namesOf(ones)} are equal`))}: groups that are each equal inside are another state or another fault, not noise. Find out what differs between the groups and read again.`);
  }
  const equal = families.find((ones) => ones.length >= 3);
  if (equal) {
    throw refuse("agreeing-reads", `${namesOf(equal)} are equal, and equal reads beat a vote. Set the others aside with a reason and approve that image.`);
  }
  if (new Set(voters.map((one) => one.seating)).size < LEAST_SEATINGS) {
    throw refuse("one-seating", `${excluded.length > 0 ? "All reads that may vote" : "All these reads"} come from one seating, and a clip that sits wrong gives the same wrong bits each time. Re-seat it and read again.`);
  }
}

/** The rules that need the vote. Throws CompositeRefusal. */
export function checkVote(vote: Vote, voters: number, excluded: readonly LeftOut[]): void {
  const beside = excluded.length > 0 ? ` ${mayNotVote(excluded)}.` : "";
  const share = vote.disputedBytes / vote.bytes.length;
  if (share > MOST_DISPUTED) {
    const percent = (Math.ceil(share * 10_000) / 100).toFixed(2);
    throw new CompositeRefusal("too-many-disputed", `The reads differ in ${countOf(vote.disputedBytes, "byte")}, ${percent} % of the image; above 1 % it is no longer a few unsure bits. Lower the clock, re-seat the clip and read again.${beside}`);
  }
  if (vote.counts.undecided > 0) {
    throw new CompositeRefusal("ties", `${countOf(vote.counts.undecided, "byte")} ${vote.counts.undecided === 1 ? "has" : "have"} as many votes for as against among ${voters} reads. Take one more read: no value is chosen without a majority.${beside}`);
  }
}
