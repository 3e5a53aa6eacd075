import {
  CONTACT_FILL_SHARE, CONTACT_LEAST_BYTES, CONTACT_LEAST_SEGMENTS, EDGE_BLOCK, EDGE_BYTES, EDGE_LEAST_SEGMENTS, EDGE_MOST_BYTES, EDGE_NEAR,
  FLIPS_SINGLE_BIT_SHARE, FOREIGN_BITS_A_BYTE, FOREIGN_LEAST_BYTES, FOREIGN_LEAST_SHARE, ONE_WAY_LEAST_FLIPS, ONE_WAY_Z, SEGMENT_GAP,
} from "./thresholds";

/** What the differing stretches of two images of one size have in common. A segment bridges gaps of up to 8 equal bytes. */
export interface SegmentFacts {
  segments: number;
  segmentBytes: number;
  differing: number;
  zeroToOne: number;
  oneToZero: number;
  /** differing bytes that differ in one bit */
  singleBit: number;
  /** segments of 8 bytes and more that are one fill value in a, in b; shorter ones of which the same can be said */
  contactA: number;
  contactB: number;
  bitsOfContactA: number;
  bitsOfContactB: number;
  smallFillA: number;
  smallFillB: number;
  /** bytes in segments of 32 and more that are fill in neither */
  foreignBytes: number;
  /** segments that start at a block's edge, and whether none is long */
  atEdges: number;
  longest: number;
  first: number;
  last: number;
}

const ONES = Uint8Array.from({ length: 256 }, (_, n) => n.toString(2).replaceAll("0", "").length);

function fillShare(bytes: Uint8Array, from: number, to: number): number {
  let ff = 0;
  let zero = 0;
  for (let i = from; i < to; i += 1) {
    if (bytes[i] === 0xff) ff += 1;
    else if (bytes[i] === 0) zero += 1;
  }
  return Math.max(ff, zero) / (to - from);
}

function addSegment(f: SegmentFacts, a: Uint8Array, b: Uint8Array, from: number, to: number): void {
  let up = 0;
  let down = 0;
  let differing = 0;
  for (let i = from; i < to; i += 1) {
    if (a[i] === b[i]) continue;
    const rising = ONES[~a[i] & b[i] & 0xff];
    const falling = ONES[a[i] & ~b[i] & 0xff];
    differing += 1;
    up += rising;
    down += falling;
    if (rising + falling === 1) f.singleBit += 1;
  }
  const length = to - from;
  const [fillA, fillB] = [fillShare(a, from, to) >= CONTACT_FILL_SHARE, fillShare(b, from, to) >= CONTACT_FILL_SHARE];
  const dense = up + down > FOREIGN_BITS_A_BYTE * differing;
  if (length >= CONTACT_LEAST_BYTES && dense) {
    if (fillA) [f.contactA, f.bitsOfContactA] = [f.contactA + 1, f.bitsOfContactA + up + down];
    if (fillB) [f.contactB, f.bitsOfContactB] = [f.contactB + 1, f.bitsOfContactB + up + down];
  }
  if (length < CONTACT_LEAST_BYTES) {
    if (fillA && !fillB) f.smallFillA += 1;
    if (fillB && !fillA) f.smallFillB += 1;
  }
  if (length >= FOREIGN_LEAST_BYTES && dense && !fillA && !fillB) f.foreignBytes += length;
  const residue = from % EDGE_BLOCK;
  if (residue < EDGE_NEAR || residue > EDGE_BLOCK - EDGE_NEAR) f.atEdges += 1;
  f.segments += 1;
  f.segmentBytes += length;
  f.differing += differing;
  f.zeroToOne += up;
  f.oneToZero += down;
  f.longest = Math.max(f.longest, length);
}

/** One pass over both images; `first` and `last` differing address. */
export function segmentFactsOf(a: Uint8Array, b: Uint8Array, first: number, last: number): SegmentFacts {
  const f: SegmentFacts = {
    segments: 0, segmentBytes: 0, differing: 0, zeroToOne: 0, oneToZero: 0, singleBit: 0, contactA: 0, contactB: 0, bitsOfContactA: 0, bitsOfContactB: 0,
    smallFillA: 0, smallFillB: 0, foreignBytes: 0, atEdges: 0, longest: 0, first, last,
  };
  let from = first;
  let end = first + 1;
  for (let i = first + 1; i <= last; i += 1) {
    if (a[i] === b[i]) continue;
    if (i - end > SEGMENT_GAP) {
      addSegment(f, a, b, from, end);
      from = i;
    }
    end = i + 1;
  }
  addSegment(f, a, b, from, end);
  return f;
}

/** F23: nothing differs but the first, or the last, 16 bytes or fewer. */
export function atOneEnd(f: SegmentFacts, size: number): "first" | "last" | null {
  // in a chip of a few bytes everything is an end
  if (size < 4 * EDGE_BYTES) return null;
  return f.last < EDGE_BYTES ? "first" : f.first >= size - EDGE_BYTES ? "last" : null;
}

/** F22: every piece is short and starts at a block's edge. */
export function lockedToEdges(f: SegmentFacts): boolean {
  return f.segments >= EDGE_LEAST_SEGMENTS && f.atEdges === f.segments && f.longest <= EDGE_MOST_BYTES;
}

/** F16: which of the two lost contact; both stretches may be fill where FF stands against 00. */
export function lostContact(f: SegmentFacts): "a" | "b" | "either" | null {
  const enough = (contact: number, small: number) => contact > 0 && contact >= CONTACT_LEAST_SEGMENTS * (f.segments - small);
  const [inA, inB] = [enough(f.contactA, f.smallFillA), enough(f.contactB, f.smallFillB)];
  if (inA && inB) return "either";
  if (inA) return "a";
  return inB ? "b" : null;
}

export function mostlySingleBits(f: SegmentFacts): boolean {
  return f.singleBit >= FLIPS_SINGLE_BIT_SHARE * f.differing;
}

/**
 * F18: how far the direction of the flips is from what the image's own bits would give, in standard deviations:
 * z = (k - n p0) / sqrt(n p0 p1). Which of the two reads is right isn't known, so the lesser of both views counts.
 */
export function oneWayScore(f: SegmentFacts, oneBitsA: number, oneBitsB: number, size: number): number {
  const flips = f.zeroToOne + f.oneToZero;
  const score = (rising: number, ones: number) => {
    const zeros = 1 - ones / (8 * size);
    const spread = Math.sqrt(flips * zeros * (1 - zeros));
    return spread === 0 ? 0 : Math.abs(rising - flips * zeros) / spread;
  };
  return flips < ONE_WAY_LEAST_FLIPS ? 0 : Math.min(score(f.zeroToOne, oneBitsA), score(f.oneToZero, oneBitsB));
}

export function oneWay(score: number): boolean {
  return score >= ONE_WAY_Z;
}

/** F19: most of what differs are long stretches of other data. */
export function foreign(f: SegmentFacts): boolean {
  return f.foreignBytes > 0 && f.foreignBytes >= FOREIGN_LEAST_SHARE * f.segmentBytes;
}
