import { SECTOR_SIZES, WEAK_CELLS_MOST } from "@/lib/core/thresholds";
import type { FindingHelp } from "./finding-help";

const severity = { blocks: "before the drive’s first start with this board", note: "after it" };
const sectors = SECTOR_SIZES.map((bytes) => `${bytes / 1024} KiB`).join(", ");

export const AFTER_HELP = {
  verified: {
    title: "Equals the approved image", severity: { note: "always" }, rule: "Every byte equals the approved image.",
    means: "At this read-back the chip held what was cleared.",
    bench: ["Go on until enough read-backs in enough seatings are there."],
  },
  "write-refused": {
    title: "Nothing was written", severity, rule: "Equals what was saved of the donor before the write.",
    means: "Write protection, a missing write-enable, or the clip is on another chip.",
    bench: ["Note the protect bits, then clear them; check the write-protect pin.", "Check that it is the right chip, and write again."],
  },
  "not-erased": {
    title: "Not erased", severity, rule: "Every bit is 1 only where both image and old content have a 1.",
    means: "A write to flash can only turn ones into zeros. Without an erase old and new mix.",
    bench: ["Erase, and check that the chip reads all FF.", "Write, and read back."],
  },
  "erased-only": {
    title: "Erased, not written", severity, rule: `All FF; or all that differs is FF and fills whole sectors (${sectors}).`,
    means: "The write stopped after the erase, or left a sector out.",
    bench: ["Write again, the whole chip.", "Read back."],
  },
  "page-wrap": {
    title: "Wrong page size", severity, rule: "In each stretch only the last part of it is there, at the stretch’s beginning.",
    means: "The programmer sent longer pages than the chip has, so each page ran over itself.",
    bench: ["Set the right chip type or page size.", "Write again."],
  },
  "partly-protected": {
    title: "A part is protected", severity, rule: "Up to a round address the image, from there on what was there before, or the other way round.",
    means: "Block protection is set for a part of the chip.",
    bench: ["Note the protect bits, before and after.", "Clear them, and write again."],
  },
  "weak-cells": {
    title: "Few single bits differ", severity, rule: `At most ${WEAK_CELLS_MOST} bytes differ, by single bits.`,
    means: "A bad read, or cells of the donor’s chip that don’t hold.",
    bench: ["Seat the clip anew and read back again.", "If the same bits differ, the chip is bad: use another donor."],
  },
  "other-image": {
    title: "The wrong file was written", severity, rule: "Equals the approved image of another chip or case.",
    means: "Two files or two boards were mixed up. The other case may be wrong too.",
    bench: ["Stop. Look at labels, ticket and file of both.", "Write the right image, and look at the other case before its drive is started."],
  },
  differs: {
    title: "Differs", severity, rule: "Not equal to the approved image, and nothing above explains it.",
    means: "The write or the read-back went wrong in a way that the bytes don’t tell.",
    bench: ["Seat the clip anew and read back once more.", "If it differs again, write again."],
  },
} satisfies Record<string, FindingHelp>;
