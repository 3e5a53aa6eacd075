import { FAMILY_LEAST_SHARE, FAMILY_MOST_SHARE } from "@/lib/core/thresholds";
import type { FindingHelp } from "./finding-help";

const percent = (share: number) => `${Number((share * 100).toPrecision(4))} %`;

export const RECORD_HELP = {
  "other-chip": {
    title: "Equals another chip of this drive", severity: { blocks: "always" }, rule: "The same digest as a counted read of another chip of this drive.",
    means: "The clip sat on the other chip of a two-chip board, or the file was filed wrongly.",
    bench: ["Set the read aside.", "Compare designators, then read the right chip."],
  },
  "other-drive": {
    title: "Equals a chip of another drive", severity: { blocks: "as a rule", reason: "when both drives carry the same serial" }, rule: "The same digest as a counted read of a chip of another drive.",
    means: "Two drives’ images were mixed up. With one serial it may be the same drive, recorded twice.",
    bench: ["Check labels and file on both cases.", "Set the wrong read aside and read again.", "If it is one drive recorded twice, a lead says so in the reason."],
  },
  "donor-content": {
    title: "Equals a donor’s own content", severity: { blocks: "always" }, rule: "The same digest as what was saved of a donor’s chip.",
    means: "The donor’s chip was read and filed as the original’s. Written back, the drive would get a stranger’s data.",
    bench: ["Set the read aside.", "Look at the shape of the labels on both boards, then read the original."],
  },
  "family-likeness": {
    title: "More or less alike than others", severity: { note: "always" }, rule: `Chips of boards with one number are normally alike in ${percent(FAMILY_LEAST_SHARE)} to ${percent(FAMILY_MOST_SHARE)} of their data, where they hold firmware. It is said only outside of that.`,
    means: "All but equal to another drive’s chip: one of the two may be a read of the other. Unlike all others: perhaps another chip, or other firmware.",
    bench: ["Check labels and designator.", "Nothing needs to be answered."],
  },
  "copy-not-a-read": {
    title: "A copy, not a second read", severity: { reason: "always" }, rule: "Digest, file name and modification time are all equal to an earlier read’s.",
    means: "The same file was sent twice. A copy says nothing that the first did not say.",
    bench: ["Set it aside.", "Read the chip again."],
  },
  "one-seating": {
    title: "All from one seating", severity: { reason: "only where the policy asks for a single seating" }, rule: "All agreeing reads come from one seating.",
    means: "A clip that sits wrong gives the same wrong image every time.",
    bench: ["Take the clip off, clean, put it on again, and read once more."],
  },
} satisfies Record<string, FindingHelp>;
