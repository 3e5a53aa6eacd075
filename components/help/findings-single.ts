import {
  ALIAS_LEAST_PAIRS, ALIAS_LEAST_SHARE, CONSTANT_BIT_BLOCKS_BYTES, CONSTANT_BIT_LEAST_BYTES, HEADER_MOST, NEARLY_BLANK_FEW, NEARLY_BLANK_SHARE, NOISE_CHI_SQUARE_HIGH,
  NOISE_CHI_SQUARE_LOW, SHORT_PERIOD_LEAST_SHARE, SHORT_PERIOD_MOST, WORD_SCORE_LEAST, WORD_SCORE_RATIO,
} from "@/lib/core/thresholds";
import type { FindingHelp } from "./finding-help";

const percent = (share: number) => `${Number((share * 100).toPrecision(4))} %`;

export const SINGLE_HELP = {
  blank: {
    title: "All FF", severity: { blocks: "always" }, rule: "Every byte is FF.",
    means: "Either the chip is empty, or nothing was connected: an open line reads as ones. The bytes can’t tell which.",
    bench: ["Read the chip’s id. FF FF FF: there is no contact. A plausible id: the chip is likely blank.", "Check pin 1, the supply at the chip’s own pins, and the levels of chip select, hold and write-protect.", "Seat the clip anew, switch the supply off and on, and read again."],
  },
  "all-zero": {
    title: "All zero", severity: { blocks: "always" }, rule: "Every byte is 00.",
    means: "No supply, a data line held low, or a reader that pulls the line down.",
    bench: ["Measure the supply at the chip while it is read.", "Check ground, look for a short between neighbouring pins.", "If the board draws the supply down, lift the supply pin or read the chip out of circuit."],
  },
  constant: {
    title: "One value throughout", severity: { blocks: "always" }, rule: "Every byte has the same value, neither FF nor 00.",
    means: "A data line is stuck, or the reader is set for another kind of chip.",
    bench: ["Check the chip type set in the reader against the marking.", "Check the data lines one by one, seat the clip anew and read again."],
  },
  "nearly-blank": {
    title: "Nearly blank", severity: { note: `with ${NEARLY_BLANK_FEW} other bytes or more`, reason: `with fewer than ${NEARLY_BLANK_FEW} other bytes` },
    rule: `One value holds at least ${percent(NEARLY_BLANK_SHARE)} of all bytes, but not all.`,
    means: "Small stores of settings look like this and are sound. Very few other bytes may be noise on an open line.",
    bench: ["Check that it is the chip you meant to read.", "Seat the clip anew and read again: do the same bytes stand in the same places?"],
  },
  "repeats-within": {
    title: "The image repeats", severity: { blocks: "when the size isn’t the chip’s, or the part repeats four times and more and no id or table confirms the size", reason: "otherwise, as two equal copies can be real" },
    rule: `The image repeats with a power of two as its period; at least ${ALIAS_LEAST_PAIRS} pairs of bytes say so.`,
    means: "A larger chip is set in the reader than is there, so that reading began again from the start; or the top address bit is lost. Some boards do keep two copies.",
    bench: ["Read the marking and the id: what size has the chip?", "Set that size and read again, or correct the chip’s size here.", "If marking and id confirm the size, a lead can say so in the reason."],
  },
  "address-line": {
    title: "An address line looks stuck", severity: { blocks: "when all pairs are equal and enough of the image says so", reason: "when nearly all are, or only a few blocks say so", note: "when just two neighbouring blocks of a mostly empty image are equal" },
    rule: `Bytes whose address differs in one bit are equal in ${percent(ALIAS_LEAST_SHARE)} and more of at least ${ALIAS_LEAST_PAIRS} pairs; it blocks at all pairs.`,
    means: "A line of an adapter has no contact, or a bit of the address was lost on its way.",
    bench: ["Clean pins and adapter, and seat the chip anew.", "Check the address length set in the reader (one to four bytes).", "Lower the clock, then read again."],
  },
  "short-period": {
    title: "An id or a status over and over", severity: { blocks: "always" },
    rule: `The same ${SHORT_PERIOD_MOST} bytes or fewer repeat in ${percent(SHORT_PERIOD_LEAST_SHARE)} and more of the image.`,
    means: "The chip answered with its id or status instead of its content: it is busy, or was asked with another command set.",
    bench: ["Check the chip type set in the reader.", "Switch the supply off and on, wait, and read again."],
  },
  "too-short": {
    title: "Too short", severity: { blocks: "always" }, rule: "Fewer bytes than the chip’s size.",
    means: "A smaller chip is set in the reader, or reading stopped early.",
    bench: ["Set the chip’s own size and read the whole chip again.", "If the recorded size is wrong, correct it by the marking. Nothing is ever filled up."],
  },
  padded: {
    title: "Too long, looks like padding", severity: { blocks: "always" }, rule: "More bytes than the chip’s size, and all that is over has one value.",
    means: "A larger chip is set in the reader, which filled up what it could not read.",
    bench: ["Set the chip’s own size and read again.", "Or correct the size by the marking. Nothing is ever trimmed."],
  },
  "extra-bytes": {
    title: "More bytes than the chip holds", severity: { blocks: "always" }, rule: `More bytes than the chip’s size, and they are not one value. Up to ${HEADER_MOST.toLocaleString("en")} bytes look like a header or trailer.`,
    means: "The program wrote a header or a trailer into the file, or a larger chip is set.",
    bench: ["Save the plain image without a header, and send that.", "Check the size set in the reader against the marking."],
  },
  "bit-slip": {
    title: "Bits lost or gained", severity: { blocks: "always, where one image shows it" },
    rule: `One image: text in it reads only when moved by 1 to 7 bits, at least ${WORD_SCORE_LEAST} bytes of it and ${WORD_SCORE_RATIO} times as much as unmoved. Two reads: from a place on one sits some bits away from the other.`,
    means: "A clock was missed or counted twice, or the bus mode is wrong. On Microwire chips it may be the family or the ORG pin.",
    bench: ["Lower the clock and shorten the leads.", "Check the bus mode, and for Microwire family and ORG pin.", "Read again, twice."],
  },
  "text-file": {
    title: "A text file, not the chip’s bytes", severity: { blocks: "always" }, rule: "Every line is an Intel HEX or S-record line, or all of it is hex digits.",
    means: "The file describes an image as text. Its digest is that of the text.",
    bench: ["Save the image as raw bytes and send that.", "Or send the text under its own format, with base, size and fill as they were when it was saved."],
  },
  "container-file": {
    title: "An archive or document", severity: { blocks: "when it is one through and through", reason: "when only its first bytes look so" }, rule: "The first bytes are those of a known kind of file (archive, document, program), and the rest fits.",
    means: "A packed or wrong file was chosen. A chip may begin with the same few bytes by chance.",
    bench: ["Unpack it and send the plain image.", "If it is the reader’s plain image, a lead can say so in the reason."],
  },
  "noise-like": {
    title: "As even as noise", severity: { reason: "always" }, rule: `Every part is as dense as random bytes, and chi-square lies between ${NOISE_CHI_SQUARE_LOW} and ${NOISE_CHI_SQUARE_HIGH}.`,
    means: "An open line picks up noise; or the content is encrypted throughout. One read can’t tell.",
    bench: ["Read again and compare: noise never repeats.", "If reads from several seatings are equal, a lead can say that the content is encrypted."],
  },
  "constant-bit": {
    title: "A bit that never changes", severity: { blocks: `from ${CONSTANT_BIT_BLOCKS_BYTES.toLocaleString("en")} bytes on, unless nearly blank`, reason: "in smaller or nearly blank images" },
    rule: `One bit is the same in every byte, over ${CONSTANT_BIT_LEAST_BYTES} bytes or more.`,
    means: "A data pin of a parallel adapter has no contact. Plain text has such a bit, too.",
    bench: ["Clean the adapter’s pins and read again.", "Look at the bytes: is it plain text?"],
  },
  "size-contradicts": {
    title: "The chip says another size", severity: { reason: "always" }, rule: "Id or parameter table give another size than the one recorded.",
    means: "The size was typed or read wrongly, or the id is not to be trusted. The chip’s own table is surer than an id.",
    bench: ["Look at the marking under a lens.", "Correct the size and read again, or say why the recorded size stands."],
  },
  "size-not-power-of-two": {
    title: "The size is no power of two", severity: { note: "always" }, rule: "The chip’s size is not 1, 2, 4, 8 … bytes.",
    means: "Nearly all chips have such a size. Nothing stands against another one.",
    bench: ["Check the marking for a slip of the pen."],
  },
} satisfies Record<string, FindingHelp>;
