import type { Composite } from "./composite";
import { countOf, sizeText, withCommas } from "./quantity";
import { address } from "./strip";
import type { Range, Severity } from "./words";

/** What a lead has to answer before a composite may be approved; the same shape as a Finding. */
export interface CompositeFinding {
  code: "derived" | "weak-bytes" | "constructed-bytes";
  severity: Severity;
  message: string;
  advice: string;
  measured: string;
  threshold: string;
  ranges?: Range[];
}

/** An image no larger than this is one small unique area as a whole. Bytes. */
const SMALL_IMAGE = 2048;
/** A stretch of data between fills is small up to this. Bytes. */
const SMALL_AREA = 256;
/** So many equal FF or 00 in a row end a stretch. */
const FILL_RUN = 16;
const PLACES_NAMED = 4;

function edge(bytes: Uint8Array, at: number, step: 1 | -1): number {
  let fills = 0;
  let i = at;
  for (; i >= 0 && i < bytes.length && Math.abs(i - at) <= SMALL_AREA + FILL_RUN; i += step) {
    const fill = bytes[i] === 0xff || bytes[i] === 0;
    fills = fill && (fills === 0 || bytes[i] === bytes[i - step]) ? fills + 1 : fill ? 1 : 0;
    if (fills === FILL_RUN) return Math.abs(i - at) - FILL_RUN + 1;
  }
  return Math.abs(i - at);
}

/** D.3: in a small unique area there is nothing else that a made-up byte could be checked against. */
function inSmallArea(bytes: Uint8Array, at: number): boolean {
  return bytes.length <= SMALL_IMAGE || edge(bytes, at, 1) + edge(bytes, at, -1) - 1 <= SMALL_AREA;
}

function places(offsets: readonly number[], count: number, sizeBytes: number): string {
  const shown = offsets.slice(0, PLACES_NAMED).map((at) => address(at, sizeBytes));
  const more = count - shown.length;
  return `${shown.join(", ")}${more > 0 ? ` and ${withCommas(more)} more` : ""}`;
}

/** Always `derived`; weak and constructed bytes where there are any (the rule of MAJORITY.md D.2 and D.3). */
export function compositeFindings(composite: Composite): CompositeFinding[] {
  const { counts, disputed, sizeBytes, bytes, sources, seatings, disputedBytes } = composite;
  const at = (standing: string) => disputed.filter((one) => one.standing === standing).map((one) => one.at);
  const found: CompositeFinding[] = [{
    code: "derived", severity: "reason",
    message: `A composite of ${sources.length} reads in ${seatings} seatings, no read: ${countOf(disputedBytes, "byte")} of ${sizeText(sizeBytes)} were put to the vote.`,
    advice: "Look at the votes behind each disputed byte. Three equal reads are better than any vote.",
    measured: countOf(disputedBytes, "disputed byte"), threshold: "at most 1 % of the bytes",
  }];
  if (counts.weak > 0) {
    const offsets = at("weak");
    found.push({
      code: "weak-bytes", severity: "reason",
      message: `${countOf(counts.weak, "byte")} won by a margin of 1 or 2 votes, at ${places(offsets, counts.weak, sizeBytes)}.`,
      advice: "A margin of 1 is no surer than a single read. Take another read, or say why these bytes may stand.",
      measured: countOf(counts.weak, "weak byte"), threshold: "margin 3", ranges: offsets.map((start) => ({ start, length: 1 })),
    });
  }
  if (counts.constructed > 0) {
    const offsets = at("constructed");
    found.push({
      code: "constructed-bytes", severity: offsets.some((offset) => inSmallArea(bytes, offset)) ? "blocks" : "reason",
      message: `${countOf(counts.constructed, "byte")} ${counts.constructed === 1 ? "holds" : "hold"} a value that no read holds, at ${places(offsets, counts.constructed, sizeBytes)}.`,
      advice: "Such a byte is made up by the vote. Take more reads until at least one holds it.",
      measured: countOf(counts.constructed, "constructed byte"), threshold: "none", ranges: offsets.map((start) => ({ start, length: 1 })),
    });
  }
  return found;
}
