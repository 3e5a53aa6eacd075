import type { ImageFacts, WholeFacts } from "./inspect";
import { countOf, sizeText, withCommas } from "./quantity";
import type { ChipOfImage } from "./single-findings";
import { rangeText } from "./strip";
import { ALIAS_BLOCK_PAIRS, ALIAS_LEAST_PAIRS, ALIAS_LEAST_SHARE, SHORT_PERIOD_LEAST_SHARE } from "./thresholds";
import type { Finding, Severity } from "./words";

/** F20: an identification or status instead of the content. */
function shortFinding({ bytes, informative, matches }: NonNullable<WholeFacts["repeats"]["short"]>): Finding {
  return {
    code: "short-period", severity: "blocks",
    message: `The same ${bytes === 1 ? "byte" : countOf(bytes, "byte")} over and over: looks like an id or a status instead of the content.`,
    advice: "The chip is busy or another command set is chosen. Check the chip type, switch the supply off and on, wait and read again.",
    measured: `${withCommas(matches)} of ${withCommas(informative)} pairs equal at a distance of ${bytes}`, threshold: `${SHORT_PERIOD_LEAST_SHARE * 100} %`,
  };
}

/** F05: two equal halves can be real; more copies, or a size that isn't the chip's, are a roll-over. */
function wholeFinding(facts: ImageFacts, chip: ChipOfImage, period: NonNullable<WholeFacts["repeats"]["period"]>): Finding {
  const size = facts.sizeBytes;
  const confirmed = chip.sizeSource === "id" || chip.sizeSource === "sfdp";
  const half = period.bytes * 2 === size;
  const severity: Severity = size !== chip.sizeBytes || (period.bytes * 4 <= size && !confirmed) ? "blocks" : "reason";
  return {
    code: "repeats-within", severity,
    message: half ? "Second half repeats the first." : `The first ${sizeText(period.bytes)} repeat to the end.`,
    advice: half
      ? "An address line is stuck, a larger chip is set, or the chip keeps two copies. Clean the pins, check marking and id, and read again."
      : `The true size looks like ${sizeText(period.bytes)}. Check marking, id and the size set in the reader, and read again.`,
    measured: `${withCommas(period.informative)} pairs equal at a distance of ${withCommas(period.bytes)}`, threshold: `all pairs, at least ${ALIAS_LEAST_PAIRS}`,
    ranges: [{ start: period.bytes, length: size - period.bytes }],
  };
}

type Line = WholeFacts["repeats"]["lines"][number];

/**
 * F06. Where most of the image is fill, a block that is kept twice on purpose looks the same as a lost line: one such
 * pair of blocks is a note, a few are a reason.
 */
function lineSeverity({ informative, matches, blockPairs }: Line, size: number): Severity {
  const dense = informative * 4 >= size;
  if (!dense && blockPairs < 2) return "note";
  return matches === informative && (dense || blockPairs >= ALIAS_BLOCK_PAIRS) ? "blocks" : "reason";
}

function lineFinding(line: Line, size: number): Finding {
  const severity = lineSeverity(line, size);
  const step = 2 ** line.line;
  const where = rangeText(step, 1, size);
  return {
    code: "address-line", severity,
    message: severity === "note"
      ? `Two neighbouring blocks of ${sizeText(step)} are equal: looks like a second copy.`
      : `The content repeats over address line ${line.line} (${where}): looks like a stuck line or a lost address bit.`,
    advice: severity === "note"
      ? "Many stores keep a copy. Nothing stands against it."
      : "Clean the pins, check the address length set in the reader, lower the clock and read again.",
    measured: `${withCommas(line.matches)} of ${withCommas(line.informative)} pairs equal`, threshold: `${ALIAS_LEAST_SHARE * 100} %, blocks at all pairs, at least ${ALIAS_LEAST_PAIRS}`,
  };
}

/** F05 F06 F20, the most telling first. Lines from a period's own on follow from it. */
export function repeatFindings(facts: ImageFacts, { repeats }: WholeFacts, chip: ChipOfImage): Finding[] {
  if (repeats.short) return [shortFinding(repeats.short)];
  const { period } = repeats;
  const lines = repeats.lines.filter(({ line }) => !period || 2 ** line < period.bytes);
  return [...(period ? [wholeFinding(facts, chip, period)] : []), ...(lines.length > 0 ? [lineFinding(lines[0], facts.sizeBytes)] : [])];
}
