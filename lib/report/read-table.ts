import { countOf, readsText, sizeText } from "@/lib/core/quantity";
import { seatingLetter } from "@/lib/core/words";
import { code, CAUTION, INK, INK_3, plain, quiet, strong } from "./ink";
import type { ReportDrawing, ReportRead } from "./report-facts";
import { erasedText, findingMark, measuredText, momentText, originText, severityWord } from "./report-words";
import { LEFT, type Sheet, type Struct } from "./sheet";
import { laneKey } from "./stacks";
import { Table } from "./table";

const INDENT = LEFT + 14;

/** Every read with its digests, where it came from and what was found on it; nothing is left out or cut. */
export async function readTable(sheet: Sheet, name: string, reads: readonly ReportRead[], lanes: ReportDrawing["lanes"]): Promise<void> {
  const table = new Table(sheet, [
    { head: "Read", width: 66 }, { head: "Seating", width: 44 }, { head: "Size", width: 64, align: "right" }, { head: "CRC-32", width: 62 },
    { head: "Operator", width: 92 }, { head: "Taken; stored", width: 106 }, { head: "Counts", width: 0 },
  ], { name });
  for (const read of reads) {
    const color = read.counted ? INK : INK_3;
    table.row([
      [strong(read.name, { color }), ...(read.derived ? [strong("\ncomposite", { size: 8, color: CAUTION })] : [])],
      [plain(read.derived ? "none" : seatingLetter(read.seating), { color })],
      [plain(sizeText(read.sizeBytes), { color })], [code(read.crc32.toUpperCase(), { color })], [plain(read.operator.name, { color })],
      [plain(`${read.takenAt ? momentText(read.takenAt) : "not stated"}\n${momentText(read.storedAt)}`, { size: 8, color })],
      [read.counted ? strong("Counted") : strong("Set aside", { color })],
    ], { keep: 42 });
    table.below((cell) => details(sheet, read, against(read, reads, lanes), cell));
    await sheet.breathe();
  }
  table.end();
}

/** More names than these say no more. */
const NAMED = 8;

/** What a read equals and what it differs from among the others of its kind. A read-back is held against the image instead. */
function against(read: ReportRead, reads: readonly ReportRead[], lanes: ReportDrawing["lanes"]): string {
  const others = reads.filter((one) => one.id !== read.id && one.stage === read.stage && read.stage !== "after");
  const [word] = read.name.split(" ");
  const twins = others.filter((one) => one.sha256 === read.sha256).map((one) => one.number);
  const differing = others.filter((one) => one.sha256 !== read.sha256);
  const other = differing.find((one) => one.counted) ?? (read.counted ? undefined : differing[0]);
  const known = other && differing.filter((one) => one.sha256 === other.sha256).map((one) => lanes[laneKey(read, one)] ?? lanes[laneKey(one, read)]).find(Boolean);
  return [
    twins.length > NAMED ? `Equals ${countOf(twins.length, "other read")} byte for byte, ${word} ${twins[0]} the first.` : twins.length > 0 ? `Equals ${readsText(twins, word)} byte for byte.` : "",
    other ? `Differs from ${other.name}${known ? ` in ${countOf(known.differingBytes, "byte")}` : ""}.` : "",
  ].filter(Boolean).join(" ");
}

function details(sheet: Sheet, read: ReportRead, said: string, element: Struct): void {
  const at = { x: INDENT, element, type: "TD", gap: 1.5 };
  sheet.paragraph([quiet("SHA-256 ", { size: 8 }), code(read.sha256)], at);
  sheet.paragraph([quiet(originText(read), { size: 8 }), ...(read.derived ? [] : [quiet(". File as it came: ", { size: 8 }), code(read.originalFileName, { size: 8 })])], at);
  if (read.erased) sheet.paragraph([strong(`Erased, ${erasedText(read.erased)}. `), plain("The image is not in this bundle; its digests stay.")], { ...at, mark: "aside" });
  if (read.source) {
    sheet.paragraph([quiet(`Expanded from the text file with SHA-256 `, { size: 8 }), code(read.source.sha256, { size: 8 }), quiet(`, base 0x${read.source.base.toString(16).toUpperCase()}, empty space filled with ${read.source.fill.toString(16).toUpperCase().padStart(2, "0")}`, { size: 8 })], at);
  }
  if (read.note) sheet.paragraph([quiet(`“${read.note}”`, { size: 8 })], at);
  if (read.setAside) sheet.paragraph([strong(`Set aside by ${read.setAside.by.name}, ${momentText(read.setAside.at)}: `), plain(read.setAside.reason)], { ...at, mark: "aside" });
  if (said) sheet.paragraph([plain(said)], at);
  if (read.findings.length === 0) sheet.paragraph([quiet("No rule found anything on it by itself.", { size: 8 })], at);
  for (const finding of read.findings) {
    sheet.paragraph([strong(`${severityWord(finding)}: `), plain(finding.message), ...(finding.code === "verified" ? [] : [plain(` ${finding.advice}`)]), quiet(measuredText(finding), { size: 8 })], { ...at, mark: findingMark(finding) });
  }
  sheet.space(4);
}
