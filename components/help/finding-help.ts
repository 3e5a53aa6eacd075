import type { DiagnosisCode } from "@/lib/core/diagnose-cause";
import type { Severity } from "@/lib/core/words";
import { AFTER_HELP } from "./findings-after";
import { COMPOSITE_HELP } from "./findings-composite";
import { PAIR_HELP } from "./findings-pair";
import { RECORD_HELP } from "./findings-record";
import { SINGLE_HELP } from "./findings-single";

/** What the help says of one code; the sentence of the screen comes from the engine itself (finding-examples.ts). */
export interface FindingHelp {
  title: string;
  /** the severities that the engine gives it, each with the words for when; none for what only compares two reads */
  severity: Partial<Record<Severity, string>>;
  /** what is measured, with the threshold */
  rule: string;
  means: string;
  bench: readonly string[];
}

export interface FindingGroup {
  key: string;
  title: string;
  about: string;
  findings: Partial<Record<DiagnosisCode, FindingHelp>>;
}

export const FINDING_GROUPS: readonly FindingGroup[] = [
  { key: "single", title: "One image by itself", about: "Looked for in each read when it is stored. They stand against reads of the original; on a donor’s own reads only the size does, the rest are notes.", findings: SINGLE_HELP },
  { key: "record", title: "Against what is on record", about: "Counted reads are compared with those of other chips, drives and donors. Images that are nearly blank are left out: they say nothing about where they come from.", findings: RECORD_HELP },
  { key: "pair", title: "Two reads compared", about: "What the difference looks like. It is a guess, and gates nothing: that the reads differ does, until one is set aside. Seen on a read-back, the same cause means that the write or the read-back went that way.", findings: PAIR_HELP },
  { key: "composite", title: "A composite", about: "What a lead has to answer before an image that was put together by majority may be approved.", findings: COMPOSITE_HELP },
  { key: "after", title: "After the write", about: "A read-back against the approved image and against what the donor held before. All but the first block; after the drive’s first start with this board they are notes, because drives rewrite their chips.", findings: AFTER_HELP },
];

/** The group that explains a code, and its help. Every code of the engine has one: a test keeps that. */
export function helpOf(code: DiagnosisCode): FindingHelp | undefined {
  return FINDING_GROUPS.map((group) => group.findings[code]).find((help) => help !== undefined);
}
