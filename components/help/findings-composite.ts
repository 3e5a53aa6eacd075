import { MOST_DISPUTED } from "@/lib/core/composite-rules";
import { FIRM_MARGIN } from "@/lib/core/composite-vote";
import type { FindingHelp } from "./finding-help";

export const COMPOSITE_HELP = {
  derived: {
    title: "A composite, no read", severity: { reason: "always" }, rule: `Every composite. At most ${MOST_DISPUTED * 100} % of its bytes may be disputed.`,
    means: "No reader gave this image as a whole. It shows what repeats, not what is true.",
    bench: ["Look at the votes behind each disputed byte.", "If three equal reads can be had, take those instead."],
  },
  "weak-bytes": {
    title: "Bytes with a thin majority", severity: { reason: "always" }, rule: `A byte whose margin is below ${FIRM_MARGIN} votes.`,
    means: "A margin of one is no surer than a single read.",
    bench: ["Take another read.", "Or say why these bytes may stand, for instance because a check sum over them fits."],
  },
  "constructed-bytes": {
    title: "Bytes that no read holds", severity: { blocks: "in a small area with nothing around to check it against", reason: "otherwise" }, rule: "The value that the vote gives for a byte stands in none of the reads.",
    means: "The bits were won by different reads, so that together they make a value that nobody has read.",
    bench: ["Take more reads until at least one holds the byte."],
  },
} satisfies Record<string, FindingHelp>;
