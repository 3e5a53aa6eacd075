import { nearlyBlank, type ImageFacts } from "./inspect";
import { listText } from "./quantity";
import type { Finding, FindingCode, Severity } from "./words";

/** A counted read of another chip with the same digest. No customer's name comes in, so none can go out. */
export interface Elsewhere {
  /** another chip of the same drive, a chip of another drive, or a donor's own content */
  relation: "other-chip" | "other-drive" | "donor-content";
  readName: string;
  designator: string;
  caseRef: string;
  /** both drives carry the same serial */
  sameSerial: boolean;
}

const NAMED = 3;

function places(hits: readonly Elsewhere[], withCase: boolean): string {
  const names = hits.slice(0, NAMED).map((hit) => `${hit.readName} of ${hit.designator}${withCase ? `, case ${hit.caseRef}` : ""}`);
  const more = hits.length - names.length;
  return listText(more > 0 ? [...names, `${more} more`] : names);
}

function crossFinding(code: FindingCode, severity: Severity, message: string, advice: string): Finding {
  return { code, severity, message, advice, measured: "all bytes equal", threshold: "equal digest" };
}

/**
 * F26 F27 F28: one finding a relation. Uniform and nearly blank images say nothing about where they come from.
 * Two drives with one serial are the same drive recorded twice: a reason, no block.
 */
export function crossFindings(facts: ImageFacts, elsewhere: readonly Elsewhere[]): Finding[] {
  if (nearlyBlank(facts)) return [];
  const of = (relation: Elsewhere["relation"]) => elsewhere.filter((hit) => hit.relation === relation);
  const [chips, drives, donors] = [of("other-chip"), of("other-drive"), of("donor-content")];
  const found: Finding[] = [];
  if (chips.length > 0) {
    found.push(crossFinding("other-chip", "blocks", `Equals ${places(chips, false)}, another chip of this drive.`,
      "Looks like the clip sat on the wrong chip or the file was filed wrongly. Set it aside and read the right chip."));
  }
  if (drives.length > 0) {
    const severity = drives.every((hit) => hit.sameSerial) ? "reason" : "blocks";
    found.push(crossFinding("other-drive", severity, `Equals ${places(drives, true)}, another drive.`,
      severity === "reason"
        ? "Both drives carry the same serial. Check that it is one drive recorded twice and say so."
        : "Looks like two drives' images were mixed up. Check labels and file, set the wrong read aside and read again."));
  }
  if (donors.length > 0) {
    found.push(crossFinding("donor-content", "blocks", `Equals ${places(donors, true)}, a donor's own content.`,
      "Looks like the donor's data was filed as the original's. Set it aside and read the original chip."));
  }
  return found;
}
