import { groupsOf8 } from "@/lib/core/digest";
import { markRow, STRIP_LEGEND, stripRow } from "@/lib/core/image-strip-text";
import { countOf, readsText, sizeText, withCommas } from "@/lib/core/quantity";
import { rangeText } from "@/lib/core/strip";
import type { Finding, Severity } from "@/lib/core/words";
import type { JudgedPair, JudgedRead, Verdict } from "./judge";

const RANGES_SHOWN = 4;
const WEIGHT: Record<Severity, string> = { blocks: "Stands against it", reason: "Needs a reason", note: "Note" };

function findingLines({ severity, message, advice, code, measured, threshold }: Finding): string[] {
  const numbers = measured === undefined ? "" : `: ${measured}${threshold === undefined ? "" : `, threshold ${threshold}`}`;
  return [`  ${WEIGHT[severity]}: ${message} ${advice}`, `    (${code}${numbers})`];
}

function readLines(read: JudgedRead): string[] {
  const { bytes } = read;
  const exact = `${withCommas(bytes.length)} bytes`;
  const size = sizeText(bytes.length) === exact ? exact : `${sizeText(bytes.length)} (${exact})`;
  return [
    `Read ${read.number}  ${read.file}`,
    `  ${size}   CRC-32 ${read.crc32.toUpperCase()}`,
    `  SHA-256 ${groupsOf8(read.sha256).join(" ")}`,
    ...(read.converted === null ? [] : [`  From ${read.converted}.`]),
    `  ${stripRow(read.facts.cells)}`,
    ...read.findings.flatMap(findingLines),
    "",
  ];
}

function pairLines({ reads, comparison, diagnosis }: JudgedPair): string[] {
  const size = Math.max(comparison.sizeA, comparison.sizeB);
  const shown = comparison.ranges.slice(0, RANGES_SHOWN).map(({ start, length }) => rangeText(start, length, size));
  const more = comparison.ranges.length - shown.length;
  const ranges = more > 0 ? `${shown.join(", ")} and ${comparison.truncated ? "more than " : ""}${withCommas(more)} more` : shown.join(", ");
  return [
    `${readsText(reads)}: ${diagnosis.message} ${diagnosis.advice}`,
    `  ${markRow(comparison.cells)}`,
    `  ${countOf(comparison.differingBytes, "byte")}, ${countOf(comparison.zeroToOne, "bit")} 0 to 1, ${countOf(comparison.oneToZero, "bit")} 1 to 0 (${diagnosis.code}, ${diagnosis.confidence}): ${ranges}`,
  ];
}

/** Equal reads once a group; differences between the first of each group only. */
function comparisonLines(reads: readonly JudgedRead[], pairs: readonly JudgedPair[]): string[] {
  const groups = [...new Set(reads.map((read) => read.sha256))].map((sha256) => reads.filter((read) => read.sha256 === sha256).map((read) => read.number));
  const first = groups.map((numbers) => numbers[0]);
  return [
    ...groups.filter((numbers) => numbers.length > 1).map((numbers) => `${readsText(numbers)}: equal.`),
    ...pairs.filter((pair) => pair.reads.every((number) => first.includes(number))).flatMap(pairLines),
    ...(pairs.length > 0 ? [""] : []),
  ];
}

/** The compact page for people; ends with a line end. */
export function pageOf(reads: readonly JudgedRead[], pairs: readonly JudgedPair[], verdict: Verdict): string {
  return [
    ...reads.flatMap(readLines),
    `  ${STRIP_LEGEND}`, "",
    ...comparisonLines(reads, pairs),
    `Verdict: ${verdict.sentence}`, "",
  ].join("\n");
}

/** The same for programs, in the shape that API.md gives. */
export function jsonOf(reads: readonly JudgedRead[], pairs: readonly JudgedPair[], verdict: Verdict): string {
  return `${JSON.stringify({
    reads: reads.map(({ file, bytes, crc32, sha256, findings }) => ({
      file, sizeBytes: bytes.length, crc32, sha256,
      findings: findings.map(({ code, severity, message, advice, measured, threshold }) => ({ code, severity, message, advice, measured, threshold })),
    })),
    comparisons: pairs.map(({ reads: numbers, comparison, diagnosis }) => ({
      reads: numbers, equal: comparison.equal, differingBytes: comparison.differingBytes,
      differingBits: { zeroToOne: comparison.zeroToOne, oneToZero: comparison.oneToZero },
      ranges: comparison.ranges, ...(comparison.truncated ? { truncated: true } : {}),
      diagnosis: { code: diagnosis.code, message: diagnosis.message, advice: diagnosis.advice, confidence: diagnosis.confidence },
    })),
    verdict,
  })}\n`;
}
