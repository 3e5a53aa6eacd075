import type { ReadBackDiagnosis } from "./diagnose-read-back";
import { isUniform, type ImageFacts } from "./inspect";
import { countOf, sizeText } from "./quantity";
import { placeText } from "./strip";
import type { Finding, FindingCode } from "./words";

export interface ReadBackInput {
  facts: ImageFacts;
  read: { sha256: string; sizeBytes: number };
  approved: { sha256: string; sizeBytes: number };
  /** digests of the donor's saved content */
  donorSaved: string[];
  /** the read-back is approved AND old, bit by bit (diagnoseReadBack) */
  equalsAnd: boolean;
  /** another standing or past approval with the read-back's digest */
  otherApproved: { designator: string; caseRef: string } | null;
  comparison: { differingBytes: number; first: number | null; last: number | null } | null;
  /** of diagnoseReadBack, where the bytes were at hand: says how the write went wrong */
  diagnosis?: ReadBackDiagnosis;
  /** taken after the board's first power-on on the drive */
  poweredOn?: boolean;
}

function finding(code: FindingCode, message: string, advice: string, measured: string): Finding {
  return { code, severity: "blocks", message, advice, measured, threshold: "every byte equal to the approved image" };
}

function differenceFinding({ read, approved, comparison }: ReadBackInput): Finding {
  const again = "Re-seat the clip and read back once more; if it differs again, write again.";
  if (read.sizeBytes !== approved.sizeBytes) {
    return finding("differs", `Differs from the approved image: ${sizeText(read.sizeBytes)} of ${sizeText(approved.sizeBytes)} read back.`,
      "Set the chip's size in the reader and read back once more.", countOf(read.sizeBytes, "byte"));
  }
  if (!comparison || comparison.first === null || comparison.last === null) {
    return finding("differs", "Differs from the approved image.", again, "another digest");
  }
  const { differingBytes, first, last } = comparison;
  return finding("differs",
    `Differs from the approved image in ${countOf(differingBytes, "byte")}, ${placeText(first, last, approved.sizeBytes)}.`,
    again, countOf(differingBytes, "differing byte"));
}

/** V1 V2 V3 V4 V9 of READ-FAULTS B.5 in the order in which one would say them, then V5 to V8, else where it differs. */
function whatHappened(input: ReadBackInput): Finding {
  const { facts, read, donorSaved } = input;
  if (donorSaved.includes(read.sha256)) {
    return finding("write-refused", "Equals what the donor held before the write: nothing was written.",
      "Clear write protection (protect bits, write-protect pin), check that it is the right chip, then write again.", "equal to the donor's saved content");
  }
  if (isUniform(facts) && facts.dominantByte === 0xff) {
    return finding("erased-only", "All FF: the chip was erased and then not written.",
      "Write again, then read back.", `all ${countOf(facts.sizeBytes, "byte")} are FF`);
  }
  if (input.equalsAnd) {
    return finding("not-erased", "Equals approved AND old content: the chip was not erased.",
      "Erase, check that it reads all FF, write, read back.", "every byte is approved AND old");
  }
  if (input.otherApproved) {
    const { designator, caseRef } = input.otherApproved;
    return finding("other-image", `Equals the approved image of ${designator}, case ${caseRef}: the wrong file was written.`,
      "Stop, check labels and file, then write the right image.", "equal to another approved image");
  }
  const { diagnosis } = input;
  if (!diagnosis || diagnosis.code === "verified") return differenceFinding(input);
  const found = finding(diagnosis.code, diagnosis.message, diagnosis.advice, diagnosis.measured);
  return diagnosis.ranges ? { ...found, ranges: diagnosis.ranges } : found;
}

/**
 * What a read-back says about the write: `verified`, or how it went wrong. After the board's first power-on on the
 * drive a difference is a note: drives rewrite their chips.
 */
export function judgeReadBack(input: ReadBackInput): Finding[] {
  const { read, approved } = input;
  if (read.sha256 === approved.sha256) {
    return [{
      code: "verified", severity: "note",
      message: `Equals the approved image in all ${countOf(approved.sizeBytes, "byte")}.`,
      advice: "Read-backs from a second seating count more than another in the same one.",
      measured: "every byte equal", threshold: "every byte equal to the approved image",
    }];
  }
  const found = whatHappened(input);
  if (!input.poweredOn) return [found];
  return [{ ...found, severity: "note", advice: "The drive has been started with this board, and drives rewrite their chips: kept as a note." }];
}
