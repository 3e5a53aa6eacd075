import { crossFindings, type Elsewhere } from "./cross-findings";
import { familyFinding, type Family } from "./family";
import type { ImageFacts } from "./inspect";
import { countOf, isPowerOfTwo, withCommas } from "./quantity";
import { singleFindings, type ChipOfImage } from "./single-findings";
import { readName, type Finding, type Policy, type Stage } from "./words";

export interface EarlierRead {
  number: number;
  stage: Stage;
  sha256: string;
  fileName: string;
  modifiedAt: string | null;
  counted: boolean;
}

export interface JudgeInput {
  stage: Stage;
  read: { sizeBytes: number; sha256: string; fileName: string; modifiedAt: string | null };
  chip: ChipOfImage;
  facts: ImageFacts;
  policy: Policy;
  /** earlier reads of the same chip and stage */
  earlier: EarlierRead[];
  /** counted reads of other chips with this very digest */
  elsewhere: Elsewhere[];
  /** the same chip on other cases' boards of the same number; left out where nothing is known of other cases */
  family?: Family;
}

/** F30: the same file a second time. Without a known modification time nothing is said. */
function copyFinding({ stage, read, earlier }: JudgeInput): Finding | null {
  const twin = earlier.find((other) => other.stage === stage && other.sha256 === read.sha256
    && other.fileName === read.fileName && read.modifiedAt !== null && other.modifiedAt === read.modifiedAt);
  if (!twin) return null;
  return {
    code: "copy-not-a-read", severity: "reason",
    message: `The same file as ${readName(twin.stage, twin.number)}: digest, name and modification time are equal.`,
    advice: "A copy is not a second read. Set it aside and read the chip again.",
    measured: "digest, file name and modification time equal", threshold: "all three equal to an earlier read's",
  };
}

function oddSizeFinding({ chip }: JudgeInput): Finding | null {
  if (isPowerOfTwo(chip.sizeBytes)) return null;
  return {
    code: "size-not-power-of-two", severity: "note",
    message: `The chip's size, ${withCommas(chip.sizeBytes)} bytes, is no power of two.`,
    advice: "Most chips have one that is. Check the marking; nothing stands against it otherwise.",
    measured: countOf(chip.sizeBytes, "byte"), threshold: "a power of two",
  };
}

/** A donor may hold anything, nothing too. */
const UNIFORM_CODES: readonly string[] = ["blank", "all-zero", "constant"];
const SIZE_CODES: readonly string[] = ["too-short", "padded", "extra-bytes"];

/** Only `before` reads gate; of a donor's own reads the size does; read-backs are judged by judgeReadBack. */
function forStage(finding: Finding, stage: Stage): Finding {
  if (stage === "before" || (stage === "donor" && SIZE_CODES.includes(finding.code))) return finding;
  const advice = stage === "donor" && UNIFORM_CODES.includes(finding.code)
    ? "Any content of the donor will do. If it should hold something, check the clip and read again."
    : finding.advice;
  return { ...finding, severity: "note", advice };
}

/**
 * F26 to F29. An image that equals another chip's is more than alike to it; one that shows a fault of its own is unlike
 * others because of that.
 */
function recordFindings({ facts, elsewhere, family }: JudgeInput, ownFault: boolean): Finding[] {
  const found = crossFindings(facts, elsewhere);
  const alike = family && found.length === 0 && !ownFault ? familyFinding(family) : null;
  return alike ? [alike] : found;
}

/** Findings on one read when it is stored: what it shows by itself, and against what is already known. */
export function judgeRead(input: JudgeInput): Finding[] {
  const own = singleFindings(input.facts, input.chip);
  const found = [
    ...own,
    copyFinding(input),
    input.stage === "after" ? null : oddSizeFinding(input),
    ...(input.stage === "before" ? recordFindings(input, own.some((finding) => finding.severity === "blocks")) : []),
  ];
  return found.filter((finding) => finding !== null).map((finding) => forStage(finding, input.stage));
}

/** F31, a finding on the chip: raised only where policy asks for one seating; with more it is `needs-reads`. */
export function oneSeatingFinding(policy: Policy, countedReads: readonly { seating: number }[]): Finding | null {
  const seatings = new Set(countedReads.map((read) => read.seating)).size;
  if (policy.seatings !== 1 || countedReads.length < 2 || seatings > 1) return null;
  return {
    code: "one-seating", severity: "reason",
    message: `All ${countedReads.length} reads come from one seating.`,
    advice: "A clip that sits wrong gives the same wrong image every time. Re-seat it and read once more.",
    measured: "1 seating", threshold: "2 seatings",
  };
}

export { singleFindings } from "./single-findings";
export { diagnoseReadBack, type ReadBackDiagnosis } from "./diagnose-read-back";
export { judgeReadBack, type ReadBackInput } from "./read-back-findings";
