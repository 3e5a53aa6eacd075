import { isUniform, nearlyBlank, type ImageFacts, type WholeFacts } from "./inspect";
import { countOf, sizeText } from "./quantity";
import { repeatFindings } from "./repeat-findings";
import { rangeText } from "./strip";
import {
  CONSTANT_BIT_BLOCKS_BYTES, CONSTANT_BIT_LEAST_BYTES, HEADER_MOST, NEARLY_BLANK_FEW, WORD_SCORE_LEAST, WORD_SCORE_RATIO,
} from "./thresholds";
import type { Finding, SizeSource } from "./words";

/** The chip as far as one image is judged by it. */
export interface ChipOfImage {
  sizeBytes: number;
  sizeSource: SizeSource;
  /** the 3-byte identification as hex, if it was read */
  idBytes?: string | null;
  sfdpBytes?: string | null;
  /** ready-made text where identification or dump contradict the chip's size (F32) */
  contradiction?: string | null;
}

const READ_AGAIN = "The chip wasn't powered or the clip isn't on. Check pin 8 and read again.";

/** What the identification adds to an image of FF throughout. */
function blankAdvice(idBytes: string | null | undefined): string {
  const id = (idBytes ?? "").replace(/\s/g, "").toLowerCase();
  if (id === "") return `${READ_AGAIN} A plausible chip id with the same result says it is truly blank.`;
  if (/^(..)\1*$/.test(id)) return `${READ_AGAIN} The id reads ${id.slice(0, 2).toUpperCase()} throughout, too: there is no contact.`;
  return "The chip answers with an id, so it is likely truly blank. Re-seat the clip, read once more and check that it is the right chip.";
}

/** F01 F02 F03: one value throughout. */
function uniformFinding(facts: ImageFacts, chip: ChipOfImage): Finding {
  const hex = facts.dominantByte.toString(16).toUpperCase().padStart(2, "0");
  const shared = { severity: "blocks", message: `All ${hex}.`, measured: `all ${countOf(facts.sizeBytes, "byte")} are ${hex}`, threshold: "every byte equal" } as const;
  if (hex === "FF") return { ...shared, code: "blank", advice: blankAdvice(chip.idBytes) };
  if (hex === "00") {
    return { ...shared, code: "all-zero", advice: "Looks like no supply or a data line held low. Measure the supply at the chip, check ground, look for a short and read again." };
  }
  return { ...shared, code: "constant", advice: "Looks like a data line that is stuck or another kind of chip set in the reader. Check both and read again." };
}

/** F07 F08 F09: any size but the chip's. Nothing is trimmed or padded. */
function sizeFinding(facts: ImageFacts, chip: ChipOfImage, tailUniform: boolean): Finding | null {
  const size = facts.sizeBytes;
  if (size === chip.sizeBytes) return null;
  const typed = chip.sizeSource === "typed" ? " The size was only typed: check it against the marking." : "";
  const shared = { severity: "blocks", measured: countOf(size, "byte"), threshold: `${countOf(chip.sizeBytes, "byte")}, the chip's size (${chip.sizeSource})` } as const;
  if (size < chip.sizeBytes) {
    const end = rangeText(size - 1, 1, chip.sizeBytes);
    return {
      ...shared, code: "too-short",
      message: `Ends at ${end}: ${sizeText(size)} of ${sizeText(chip.sizeBytes)}.`,
      advice: `The reader stopped early or a smaller chip was set. Read the whole chip again.${typed}`,
      ranges: [{ start: size, length: chip.sizeBytes - size }],
    };
  }
  const over = size - chip.sizeBytes;
  const where = rangeText(chip.sizeBytes, over, size);
  const ranges = [{ start: chip.sizeBytes, length: over }];
  if (tailUniform) {
    return {
      ...shared, code: "padded", ranges,
      message: `${countOf(over, "byte")} too long, and ${where} holds one fill value: looks like padding.`,
      advice: `Set the chip's own size in the reader and read again, or correct the chip's size.${typed}`,
    };
  }
  return {
    ...shared, code: "extra-bytes", ranges,
    message: `${countOf(over, "byte")} more than the chip holds, ${where}.`,
    advice: over <= HEADER_MOST
      ? `Looks like a header or a trailer. Save the plain image and upload it, or correct the chip's size.${typed}`
      : `Looks like a header, a trailer or a larger chip set in the reader. Save the plain image and upload it, or correct the chip's size.${typed}`,
  };
}

/** F04: legitimate for small parameter stores. */
function nearlyBlankFinding(facts: ImageFacts): Finding | null {
  if (!nearlyBlank(facts)) return null;
  const others = facts.sizeBytes - facts.dominantCount;
  const hex = facts.dominantByte.toString(16).toUpperCase().padStart(2, "0");
  const few = others < NEARLY_BLANK_FEW;
  return {
    code: "nearly-blank", severity: few ? "reason" : "note",
    message: `All ${hex} but for ${countOf(others, "byte")}.`,
    advice: few ? "So little may be noise or a bad contact. Re-seat the clip, read again and check that these bytes repeat." : "Small parameter stores look like this. Check that it is the chip you meant to read.",
    measured: countOf(others, "other byte"), threshold: `99.9 % of one value; a reason below ${NEARLY_BLANK_FEW} other bytes`,
  };
}

const TEXT_NAME = { "intel-hex": "Intel HEX records", "s-record": "Motorola S-records", "hex-text": "hex digits as text" } as const;
const CONTAINER_NAME = { zip: "a ZIP archive", gzip: "a gzip file", "7z": "a 7z archive", pdf: "a PDF document", elf: "an ELF program file" } as const;

/** F24 F25: a file that stands for an image, or holds one, but is none. */
function fileKindFinding({ text, container }: WholeFacts): Finding | null {
  if (text) {
    return {
      code: "text-file", severity: "blocks",
      message: `The file is text, ${TEXT_NAME[text]}, not the chip's bytes.`,
      advice: "Save the image as raw bytes, or upload the file again under its own format with base, size and fill.",
      measured: TEXT_NAME[text], threshold: "every line or character fits",
    };
  }
  if (!container) return null;
  const name = CONTAINER_NAME[container.kind];
  if (!container.parses) {
    return {
      code: "container-file", severity: "reason",
      message: `The first bytes are those of ${name}, the rest doesn't fit one.`,
      advice: "A chip may begin so by chance. Check that the file is the reader's plain image.",
      measured: "first bytes alone", threshold: "first bytes and structure",
    };
  }
  return {
    code: "container-file", severity: "blocks", message: `The file is ${name}, not a chip's image.`,
    advice: "Unpack it and upload the plain image.", measured: "first bytes and structure fit", threshold: "first bytes and structure",
  };
}

/** F10 on one image: text that reads only when the bits are moved. */
function bitSlipFinding({ wordScores }: WholeFacts): Finding | null {
  const best = Math.max(...wordScores.slice(1));
  if (best < WORD_SCORE_LEAST || best < WORD_SCORE_RATIO * wordScores[0]) return null;
  const shift = wordScores.indexOf(best, 1);
  return {
    code: "bit-slip", severity: "blocks",
    message: `Text in it reads only ${countOf(shift, "bit")} further on: looks like bits that were lost or gained.`,
    advice: "Lower the clock, shorten the leads, check the bus mode and, for Microwire, family and ORG pin, then read again.",
    measured: `${countOf(best, "text byte")} shifted, ${countOf(wordScores[0], "text byte")} as read`,
    threshold: `${WORD_SCORE_LEAST} and ${WORD_SCORE_RATIO} times as many`,
  };
}

/** F33: noise or a wholly encrypted image; the bytes can't tell. */
function noiseFinding(whole: WholeFacts): Finding | null {
  if (!whole.noiseLike) return null;
  return {
    code: "noise-like", severity: "reason",
    message: "Every part is as even as noise: looks like a floating line, or the content is encrypted throughout.",
    advice: "Read again and compare: noise never repeats.",
    measured: `entropy ${whole.entropy} bits a byte, chi-square ${whole.chiSquare}`, threshold: "every block as dense as random bytes, chi-square 205.42 to 310.46",
  };
}

/** F34: a bit that never changes. */
function constantBitFinding(facts: ImageFacts, whole: WholeFacts): Finding | null {
  if (facts.sizeBytes < CONSTANT_BIT_LEAST_BYTES) return null;
  const high = [7, 6, 5, 4, 3, 2, 1, 0].filter((bit) => (whole.alwaysOne >> bit) & 1);
  const low = [7, 6, 5, 4, 3, 2, 1, 0].filter((bit) => ((whole.everOne >> bit) & 1) === 0);
  if (high.length + low.length === 0) return null;
  const said = [...high.map((bit) => `bit ${bit} is always 1`), ...low.map((bit) => `bit ${bit} is always 0`)].join(", ");
  // a few bytes in a blank chip may well share a bit: real stores of settings do (READ-FAULTS, F04: never block on it)
  const severity = facts.sizeBytes >= CONSTANT_BIT_BLOCKS_BYTES && !nearlyBlank(facts) ? "blocks" : "reason";
  return {
    code: "constant-bit", severity,
    message: `In every byte ${said}.`,
    advice: "Looks like a data pin of a parallel adapter without contact, or plain text. Clean the adapter's pins and read again.",
    measured: said, threshold: `no bit constant over ${CONSTANT_BIT_LEAST_BYTES} bytes or more`,
  };
}

/** F32: the text comes from who compared identification and size. */
function contradictionFinding({ contradiction }: ChipOfImage): Finding | null {
  if (!contradiction) return null;
  return { code: "size-contradicts", severity: "reason", message: contradiction, advice: "Check the marking and correct the chip's size, or say why it stands." };
}

/** Where one cause explains the image, what merely follows from it is left out. */
function contentFindings(facts: ImageFacts, chip: ChipOfImage): Finding[] {
  const { whole } = facts;
  const blank = nearlyBlankFinding(facts);
  if (!whole) return blank ? [blank] : [];
  const kind = fileKindFinding(whole);
  if (kind && (whole.text || kind.severity === "blocks")) return [kind];
  const repeats = repeatFindings(facts, whole, chip);
  const short = repeats.some((one) => one.code === "short-period");
  return [blank, kind, ...repeats, bitSlipFinding(whole), noiseFinding(whole), short ? null : constantBitFinding(facts, whole)].filter((one) => one !== null);
}

/**
 * All rows that a single image shows: F01 to F10, F20, F24, F25, F32 to F34. Severities are those for a `before`
 * read.
 */
export function singleFindings(facts: ImageFacts, chip: ChipOfImage): Finding[] {
  if (facts.sizeBytes === 0) return [sizeFinding(facts, chip, false)].filter((one) => one !== null);
  const uniformTail = facts.whole !== undefined && facts.whole.endRun >= facts.sizeBytes - chip.sizeBytes;
  return [
    ...(isUniform(facts) ? [uniformFinding(facts, chip)] : []),
    sizeFinding(facts, chip, uniformTail),
    ...(isUniform(facts) ? [] : contentFindings(facts, chip)),
    contradictionFinding(chip),
  ].filter((one) => one !== null);
}
