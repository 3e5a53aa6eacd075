import { chipIdFacts, pastedHex } from "@/lib/core/chip-id";
import { sizeText } from "@/lib/core/quantity";
import { parseSfdp, SfdpError } from "@/lib/core/sfdp";

/** A size that the chip itself tells, to be taken over by hand. */
export interface SizeProposal {
  bytes: number;
  source: "id" | "sfdp";
}

export interface ChipSays {
  /** in order, did not answer or makes no sense, or not yet read as hex */
  kind: "ok" | "caution" | "wait";
  sentence: string;
  proposal: SizeProposal | null;
}

const unfinished = (sentence: string): ChipSays => ({ kind: "wait", sentence, proposal: null });

/** What the three bytes of an id say, while they are typed; null for an empty field. */
export function idSays(text: string): ChipSays | null {
  if (text.trim() === "") return null;
  try {
    const { plausible, proposedBytes, sentence } = chipIdFacts(pastedHex(text));
    return { kind: plausible ? "ok" : "caution", sentence, proposal: proposedBytes === null ? null : { bytes: proposedBytes, source: "id" } };
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    return unfinished("Three bytes as hex digits, such as 12 40 13.");
  }
}

/** What a pasted SFDP table says; null for an empty field. */
export function sfdpSays(text: string): ChipSays | null {
  if (text.trim() === "") return null;
  try {
    const { revision, sizeBytes } = parseSfdp(pastedHex(text));
    return { kind: "ok", sentence: `A table of edition ${revision}: the chip says ${sizeText(sizeBytes)} of itself.`, proposal: { bytes: sizeBytes, source: "sfdp" } };
  } catch (error) {
    if (error instanceof SfdpError) return { kind: "caution", sentence: error.message, proposal: null };
    if (!(error instanceof RangeError)) throw error;
    return unfinished("The dump as hex digits, two a byte, from address 0.");
  }
}
