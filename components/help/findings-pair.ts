import {
  CONTACT_FILL_SHARE, CONTACT_LEAST_BYTES, EDGE_BLOCK, EDGE_BYTES, EDGE_LEAST_SEGMENTS, FLIPS_SINGLE_BIT_SHARE, FOREIGN_LEAST_BYTES, ONE_WAY_LEAST_FLIPS, SHIFT_LEAST_SHARE,
} from "@/lib/core/thresholds";
import type { FindingHelp } from "./finding-help";

const percent = (share: number) => `${Number((share * 100).toPrecision(4))} %`;
const severity = {};

export const PAIR_HELP = {
  equal: {
    title: "Equal", severity, rule: "Every byte is the same.",
    means: "The chip gave the same bytes twice. That is not proof that they are right.",
    bench: ["A read from another seating says more than another one from the same."],
  },
  "different-length": {
    title: "Different lengths", severity, rule: "The two reads have different numbers of bytes, and neither is a part of the other.",
    means: "The size set in the reader was not the same both times.",
    bench: ["Check the size set in the reader against the chip.", "Read the whole chip again."],
  },
  "byte-slip": {
    title: "Bytes lost or repeated", severity, rule: `From a place on, one read sits whole bytes away from the other; at least ${percent(SHIFT_LEAST_SHARE)} of what follows fits at one shift.`,
    means: "A buffer ran over, the hold line twitched, or the reader lost its link for a moment.",
    bench: ["Use another USB port or cable, or smaller read blocks.", "Tie hold and write-protect to the supply.", "Read again."],
  },
  "command-echo": {
    title: "The command stands at the start", severity, rule: "The image begins with the four bytes of the read command; the content follows.",
    means: "The reader begins to listen one phase too early, and so the last bytes of the chip are missing.",
    bench: ["Check the reader’s settings for the bus mode.", "Read again."],
  },
  rotated: {
    title: "Began at another address", severity, rule: "The same bytes, but from another place on, with the beginning at the end.",
    means: "Reading didn’t start at address 0, or the address length is set wrong.",
    bench: ["Start at address 0.", "Check the address length, for I²C the block-select pins, and read again."],
  },
  "byte-swapped": {
    title: "Another byte order", severity, rule: "The same bytes, exchanged within every 16 or 32 bits.",
    means: "The organisation pin or the word order in the reader is set otherwise.",
    bench: ["Choose one order for all reads of this chip.", "Check the organisation pin, and read again in that order."],
  },
  "bit-reversed": {
    title: "Another bit order", severity, rule: "Every byte has its bits in reverse.",
    means: "The reader takes the lowest bit first.",
    bench: ["Set the bit order right, and read again."],
  },
  inverted: {
    title: "Inverted", severity, rule: "Every bit is the opposite.",
    means: "An adapter turns the levels round.",
    bench: ["Take the inverting adapter out, or set it right, and read again."],
  },
  rearranged: {
    title: "The same bytes in another order", severity, rule: "Both hold each value equally often, and no simpler order explains it.",
    means: "Two lines are exchanged in the adapter.",
    bench: ["Check the adapter’s wiring line by line, and read again."],
  },
  "lost-contact": {
    title: "Contact was lost", severity, rule: `Stretches of ${CONTACT_LEAST_BYTES} bytes and more of which one read holds ${percent(CONTACT_FILL_SHARE)} and more as FF or 00, the other not.`,
    means: "The clip lost a pin for a moment.",
    bench: ["Clean off oxide and flux.", "Seat the clip anew, hold it still, and read again.", "If it comes back, use another clip, or lift the chip with the lead’s word."],
  },
  "random-flips": {
    title: "Single bits flip", severity, rule: `At least ${percent(FLIPS_SINGLE_BIT_SHARE)} of the differing bytes differ in one bit only.`,
    means: "The clock is too fast, the supply is weak, or something disturbs the lines.",
    bench: ["Lower the clock and shorten the leads.", "Put 100 nF across the supply at the chip, measure the supply under load.", "Read twice more."],
  },
  "one-way-flips": {
    title: "Bits flip one way", severity, rule: `As single bits that flip, ${ONE_WAY_LEAST_FLIPS} or more, and far more of them one way than chance would give.`,
    means: "From 0 to 1: a weak low level, a bad ground or contact, or cells that lose their charge. From 1 to 0: low supply or a line under load. It is consistent with these, and proves none.",
    bench: ["Check ground, contact and supply under load.", "Lower the clock and read twice more.", "If the same bits go on changing, take many reads: a composite may be the last way."],
  },
  "foreign-blocks": {
    title: "Blocks of other data", severity, rule: `Stretches of ${FOREIGN_LEAST_BYTES} bytes and more in which both hold data, and not the same.`,
    means: "Another part of the board talked on the line while the chip was read.",
    bench: ["Hold the controller in reset, or lift the data or supply pin.", "Or read the chip out of circuit, with the lead’s word."],
  },
  "buffer-edge": {
    title: "Errors at the reader’s buffer edge", severity, rule: `At least ${EDGE_LEAST_SEGMENTS} short differences that all begin at the same place of a block of ${EDGE_BLOCK} bytes.`,
    means: "It is the reader, its cable or its driver, and not the chip.",
    bench: ["Use another USB port, cable or driver, or smaller read blocks.", "Read again."],
  },
  "edge-bytes": {
    title: "Only the first or last bytes", severity, rule: `All differences lie within the first, or the last, ${EDGE_BYTES} bytes.`,
    means: "Reading began before the chip was ready after power-up, or chip select let go too soon.",
    bench: ["Wait 10 ms after power-up.", "Check the chip select line, and read again."],
  },
  unclassified: {
    title: "The cause can’t be told", severity, rule: "The reads differ, and no pattern above fits or too little content is there.",
    means: "Nothing is wrong with the comparison; the bytes just don’t say why.",
    bench: ["Clean the pins, seat the clip anew, lower the clock and read again.", "The reads that agree show which one is off."],
  },
} satisfies Record<string, FindingHelp>;
