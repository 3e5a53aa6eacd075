import { crossFindings, type Elsewhere } from "./cross-findings";
import { isUniform, type ImageFacts } from "./inspect";
import { countOf, isPowerOfTwo, sizeText, withCommas } from "./quantity";
import { rangeText } from "./strip";
import { readName, type Finding, type Policy, type SizeSource, type Stage } from "./words";

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
  chip: { sizeBytes: number; sizeSource: SizeSource };
  facts: ImageFacts;
  policy: Policy;
  /** earlier reads of the same chip and stage */
  earlier: EarlierRead[];
  /** counted reads of other chips with this very digest */
  elsewhere: Elsewhere[];
  /** for an image longer than the chip: whether all bytes past the chip's size are one fill value */
  tail?: { uniform: boolean };
}

const READ_AGAIN = "The chip wasn't powered or the clip isn't on. Check pin 8 and read again.";

/** F01 F02 F03: one value throughout. */
function uniformFinding({ facts, stage }: JudgeInput): Finding | null {
  if (!isUniform(facts)) return null;
  const hex = facts.dominantByte.toString(16).toUpperCase().padStart(2, "0");
  const shared = { severity: "blocks", measured: `all ${countOf(facts.sizeBytes, "byte")} are ${hex}`, threshold: "every byte equal" } as const;
  const message = `All ${hex}.`;
  if (stage === "donor") {
    const code = hex === "FF" ? "blank" : hex === "00" ? "all-zero" : "constant";
    return { ...shared, code, message, advice: "Any content of the donor will do. If it should hold something, check the clip and read again." };
  }
  if (hex === "FF") {
    return { ...shared, code: "blank", message, advice: `${READ_AGAIN} A plausible chip id with the same result says it is truly blank.` };
  }
  if (hex === "00") {
    return { ...shared, code: "all-zero", message, advice: "Looks like no supply or a data line held low. Measure the supply at the chip, check ground, look for a short and read again." };
  }
  return { ...shared, code: "constant", message, advice: "Looks like a data line that is stuck or another kind of chip set in the reader. Check both and read again." };
}

/** F07 F08 F09: any size but the chip's. Nothing is trimmed or padded. */
function sizeFinding({ read, chip, tail }: JudgeInput): Finding | null {
  if (read.sizeBytes === chip.sizeBytes) return null;
  const typed = chip.sizeSource === "typed" ? " The size was only typed: check it against the marking." : "";
  const shared = {
    severity: "blocks",
    measured: countOf(read.sizeBytes, "byte"),
    threshold: `${countOf(chip.sizeBytes, "byte")}, the chip's size (${chip.sizeSource})`,
  } as const;
  if (read.sizeBytes < chip.sizeBytes) {
    const end = rangeText(read.sizeBytes - 1, 1, chip.sizeBytes);
    return {
      ...shared, code: "too-short",
      message: `Ends at ${end}: ${sizeText(read.sizeBytes)} of ${sizeText(chip.sizeBytes)}.`,
      advice: `The reader stopped early or a smaller chip was set. Read the whole chip again.${typed}`,
      ranges: [{ start: read.sizeBytes, length: chip.sizeBytes - read.sizeBytes }],
    };
  }
  const over = read.sizeBytes - chip.sizeBytes;
  const where = rangeText(chip.sizeBytes, over, read.sizeBytes);
  const ranges = [{ start: chip.sizeBytes, length: over }];
  if (tail?.uniform) {
    return {
      ...shared, code: "padded", ranges,
      message: `${countOf(over, "byte")} too long, and ${where} holds one fill value: looks like padding.`,
      advice: `Set the chip's own size in the reader and read again, or correct the chip's size.${typed}`,
    };
  }
  return {
    ...shared, code: "extra-bytes", ranges,
    message: `${countOf(over, "byte")} more than the chip holds, ${where}.`,
    advice: `Looks like a header, a trailer or a larger chip set in the reader. Save the plain image and upload it, or correct the chip's size.${typed}`,
  };
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

const SIZE_CODES: readonly string[] = ["too-short", "padded", "extra-bytes"];

/** Only `before` reads gate; of a donor's own reads the size does; read-backs are judged by judgeReadBack. */
function forStage(finding: Finding, stage: Stage): Finding {
  if (stage === "before" || (stage === "donor" && SIZE_CODES.includes(finding.code))) return finding;
  return { ...finding, severity: "note" };
}

/** Findings on one read when it is stored: what it shows by itself, and against what is already known. */
export function judgeRead(input: JudgeInput): Finding[] {
  const found = [
    uniformFinding(input),
    sizeFinding(input),
    copyFinding(input),
    input.stage === "after" ? null : oddSizeFinding(input),
    ...(input.stage === "before" ? crossFindings(input.facts, input.elsewhere) : []),
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

export { createAndMatch } from "./compare";
export { judgeReadBack, type ReadBackInput } from "./read-back-findings";
