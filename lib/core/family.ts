import { withCommas } from "./quantity";
import { FAMILY_LEAST_BYTES, FAMILY_LEAST_SHARE, FAMILY_MOST_SHARE } from "./thresholds";
import type { Finding } from "./words";

/** Two images of one size, without the bytes that are the same fill (FF or 00) in both. */
export interface Likeness {
  informativeBytes: number;
  /** of the informative bytes, those that are equal */
  equalBytes: number;
}

/** A counted read of another case's chip: same board number, same place on the board, same size. */
export interface Relative extends Likeness {
  readName: string;
  designator: string;
  caseRef: string;
}

export interface Family {
  /** the chips that were looked at, each with its likeness to the read; never one that equals it */
  relatives: Relative[];
  /** the nearest two of these chips to each other; null where it was not asked for */
  among: Likeness | null;
}

/** READ-FAULTS F29. Images of one length; linear. */
export function likenessOf(a: Uint8Array, b: Uint8Array): Likeness {
  let [fill, equalBytes] = [0, 0];
  for (let i = 0; i < a.length; i += 1) {
    if (a[i] !== b[i]) continue;
    if (a[i] === 0xff || a[i] === 0) fill += 1;
    else equalBytes += 1;
  }
  return { informativeBytes: a.length - fill, equalBytes };
}

const shareOf = ({ informativeBytes, equalBytes }: Likeness) => (informativeBytes === 0 ? 0 : equalBytes / informativeBytes);

/** The most alike; the first of several. */
export function nearest<T extends Likeness>(some: readonly T[]): T | null {
  return some.reduce<T | null>((best, one) => (best === null || shareOf(one) > shareOf(best) ? one : best), null);
}

/** As alike as two images of one kind of firmware at least are. Too little data says nothing. */
export function alike(likeness: Likeness | null): boolean {
  return likeness !== null && likeness.informativeBytes >= FAMILY_LEAST_BYTES && shareOf(likeness) >= FAMILY_LEAST_SHARE;
}

/** 0.99987 is "99.98 %": never rounded up to a whole. */
const percent = (likeness: Likeness) => `${(Math.floor(shareOf(likeness) * 10_000) / 100).toFixed(2)} %`;

/**
 * F29, a note only: how alike a read is to the same chip of other cases' boards, where that is out of the ordinary.
 * Said of an image that all but equals another chip's; and of one that is unlike all of them, once two of them have
 * shown that this chip holds the same on every board: chips with a drive's own settings are never alike.
 */
export function familyFinding({ relatives, among }: Family): Finding | null {
  const next = nearest(relatives);
  if (!next || next.informativeBytes < FAMILY_LEAST_BYTES) return null;
  const other = `${next.readName} of ${next.designator}, case ${next.caseRef}`;
  const shared = {
    code: "family-likeness", severity: "note",
    measured: `${percent(next)} of ${withCommas(next.informativeBytes)} bytes equal, fill left out`,
    threshold: `${FAMILY_LEAST_SHARE * 100} to ${FAMILY_MOST_SHARE * 100} % between boards of one number`,
  } as const;
  if (shareOf(next) >= FAMILY_MOST_SHARE) {
    const off = next.informativeBytes - next.equalBytes;
    return {
      ...shared, message: `Equals ${other}, in all but ${withCommas(off)} ${off === 1 ? "byte" : "bytes"}; that board has the same number.`,
      advice: "Chips of two drives differ in more as a rule. Check the labels: one of the two may be a read of the other chip.",
    };
  }
  if (alike(next) || !among || !alike(among)) return null;
  return {
    ...shared, message: `Unlike the same chip of other boards with this number: ${percent(next)} of its data equal ${other}, the nearest.`,
    advice: `Two of those are alike to ${percent(among)}. Check that it is the right chip and read with the right settings; other firmware would explain it, too.`,
  };
}
