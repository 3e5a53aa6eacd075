import { canonicalJson } from "./canonical";
import { checkVote, checkVoters } from "./composite-rules";
import { voteBits, type Vote } from "./composite-vote";
import { crc32Hex, crc32Of } from "./digest";
import { bitErrorAtMargin, byteConfidence, expectedWrongBits } from "./majority-odds";

export interface CompositeSource {
  /** of the read's image, 64 lower-case hex digits */
  sha256: string;
  bytes: Uint8Array;
  seating: number;
  /** as shown, for "values per read" */
  number?: number;
  /** why this read may not vote (voteExclusion); kept in the provenance */
  excluded?: string | null;
}

interface Named {
  sha256: string;
  seating: number;
  number: number | null;
}

/** "if errors are independent": decimal text with four digits, so that the report's digest never hangs on a last bit. */
export interface CompositeOdds {
  /** wrong bits a bit and read, estimated from the votes that lost */
  bitErrorRate: string;
  /** before looking at the margins: N·P(n,p), null for an even number of voters */
  expectedWrongBits: string | null;
  /** from the margins that really occurred */
  expectedWrongBitsByMargin: string;
  /** chance that the least sure byte is right; null when nothing was disputed */
  leastSureByte: string | null;
}

export interface Composite extends Vote {
  method: string;
  version: number;
  sizeBytes: number;
  crc32: string;
  /** the voters in the order of `values` of a disputed byte: by digest, then seating, then number */
  sources: Named[];
  excluded: (Named & { cause: string })[];
  seatings: number;
  /** voters whose whole image is the composite's */
  equalSources: number;
  odds: CompositeOdds;
  limit: string;
}

export const COMPOSITE_VERSION = 1;

/** Printed with every vote (MAJORITY.md D.2). */
export const COMPOSITE_LIMIT = "A majority shows what repeats, not what is true. A stuck line, a wrong size, the wrong chip or a contact fault that repeats gives equal wrong reads every time, whatever their number. Odds hold only if errors are independent.";

const inOrder = (a: CompositeSource, b: CompositeSource) =>
  (a.sha256 < b.sha256 ? -1 : a.sha256 > b.sha256 ? 1 : 0) || a.seating - b.seating || (a.number ?? 0) - (b.number ?? 0)
  || ((a.excluded ?? "") < (b.excluded ?? "") ? -1 : 1);
const named = ({ sha256, seating, number }: CompositeSource): Named => ({ sha256, seating, number: number ?? null });
const asText = (n: number) => n.toExponential(3);

function oddsOf(vote: Vote, voters: number): CompositeOdds {
  const bits = 8 * vote.bytes.length;
  const p = vote.minorityVotes / (bits * voters);
  if (p === 0) return { bitErrorRate: "0", expectedWrongBits: "0", expectedWrongBitsByMargin: "0", leastSureByte: null };
  const leastSure = vote.disputed.reduce((least, one) => Math.min(least, byteConfidence(one.margins, p)), 1);
  return {
    bitErrorRate: asText(p),
    expectedWrongBits: voters % 2 === 1 ? asText(expectedWrongBits(bits, voters, p)) : null,
    expectedWrongBitsByMargin: asText(vote.bitsAtMargin.reduce((sum, count, margin) => sum + count * bitErrorAtMargin(margin, p), 0)),
    leastSureByte: leastSure.toFixed(9),
  };
}

function sameBytes(a: Uint8Array, b: Uint8Array): boolean {
  for (let i = 0; i < a.length; i += 1) if (a[i] !== b[i]) return false;
  return true;
}

/**
 * Bitwise majority of the sources that may vote, with what each disputed byte rests on. The same sources give the same
 * bytes and the same report in whatever order they come. Throws CompositeRefusal when a rule of MAJORITY.md D.1 stands
 * against it: fewer than 3 voters, different sizes, two families, three equal reads, one seating, more than 1 % of bytes
 * disputed, a tie.
 */
export function makeComposite(sources: readonly CompositeSource[]): Composite {
  const ordered = [...sources].sort(inOrder);
  const voters = ordered.filter((one) => !one.excluded);
  const excluded = ordered.flatMap((one) => (one.excluded ? [{ ...named(one), cause: one.excluded }] : []));
  checkVoters(voters, excluded);
  const vote = voteBits(voters.map((one) => one.bytes));
  checkVote(vote, voters.length, excluded);
  return {
    ...vote,
    method: `bit majority, n=${voters.length}`, version: COMPOSITE_VERSION,
    sizeBytes: vote.bytes.length, crc32: crc32Hex(crc32Of(vote.bytes)),
    sources: voters.map(named), excluded,
    seatings: new Set(voters.map((one) => one.seating)).size,
    equalSources: voters.filter((one) => sameBytes(one.bytes, vote.bytes)).length,
    odds: oddsOf(vote, voters.length), limit: COMPOSITE_LIMIT,
  };
}

/**
 * The provenance as canonical JSON (RFC 8785): what is kept beside the image, and whose digest goes into the log.
 * `sha256` is the composite's own digest; who ran it, who accepted it and why are the log's to say.
 */
export function compositeReport(composite: Composite, sha256: string): string {
  const { method, version, sizeBytes, crc32, sources, excluded, seatings, equalSources, counts, odds, limit } = composite;
  const { disputed, disputedBytes, truncated, minorityVotes, bitsAtMargin } = composite;
  return canonicalJson({
    derived: true, method, version, sizeBytes, crc32, sha256, sources, excluded, seatings, equalSources,
    counts: { ...counts, disputed: disputedBytes }, minorityVotes, bitsAtMargin, odds, limit, truncated,
    disputed: disputed.map(({ at, values, chosen, support, margin, margins, standing }) => ({ at, values, chosen, support, margin, margins, standing })),
  });
}
